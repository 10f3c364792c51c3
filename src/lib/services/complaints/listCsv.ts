import { listComplaints } from '#db/queries/complaints';
import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import type { Complaint } from '#lib/contracts/complaints';
import { csvText, type Cell } from '#lib/format/csvText';
import { localDateAt } from '#lib/time/zone';
import type { ComplaintListFilter } from './listCases';
import { complaintView } from './view';

/** Most rows of one file. */
export const MOST_CSV_COMPLAINTS = 50_000;

const COLUMNS: [heading: string, cell: (complaint: Complaint) => Cell][] = [
  ['reference', ({ reference }) => reference],
  ['from', ({ from }) => from],
  ['to', ({ to }) => to],
  ['kind', ({ kind }) => kind],
  ['area', ({ area }) => area],
  ['nearestStation', ({ nearestStation }) => nearestStation],
  ['latitude', ({ coarsePlace }) => coarsePlace?.latitude ?? null],
  ['longitude', ({ coarsePlace }) => coarsePlace?.longitude ?? null],
  ['source', ({ source }) => source],
  ['status', ({ status }) => status],
  ['dueOn', ({ dueOn }) => dueOn],
  ['isOverdue', ({ isOverdue }) => isOverdue],
  ['assignedTo', ({ assignedTo }) => assignedTo],
  ['createdAt', ({ createdAt }) => createdAt],
  ['answeredAt', ({ answeredAt }) => answeredAt],
  ['closedAt', ({ closedAt }) => closedAt],
  ['closingReason', ({ closingReason }) => closingReason],
  ['mergedInto', ({ mergedInto }) => mergedInto],
];

/** The whole list of a filter as CSV by due date, never with personal data; null when it has more than `MOST_CSV_COMPLAINTS`. */
export async function complaintsCsv(
  network: NetworkRow,
  settings: NetworkSettings,
  filter: ComplaintListFilter,
  now: Date,
): Promise<string | null> {
  const rows = await listComplaints(network.id, { ...filter, limit: MOST_CSV_COMPLAINTS + 1 });
  if (rows.length > MOST_CSV_COMPLAINTS) return null;
  const today = localDateAt(Math.floor(now.getTime() / 1000), settings.timeZone);
  return csvText([
    COLUMNS.map(([heading]) => heading),
    ...rows.map((row) => {
      const complaint = complaintView(row, today);
      return COLUMNS.map(([, cell]) => cell(complaint));
    }),
  ]);
}
