import {
  countByStatus,
  listComplaints,
  type ComplaintCounts,
  type ComplaintFilter,
} from '#db/queries/complaints';
import type { NetworkRow, NetworkSettings } from '#db/queries/networks';
import type { Complaint } from '#lib/contracts/complaints';
import { localDateAt } from '#lib/time/zone';
import { complaintView } from './view';

/** Where a list goes on: due date as the number yyyymmdd, and id, of its last item. */
export type ListCursor = [dueOn: number, id: number];

export interface ComplaintPage {
  items: Complaint[];
  next: ListCursor | null;
}

/** What a list of complaints is narrowed by. */
export type ComplaintListFilter = Omit<ComplaintFilter, 'after' | 'limit'>;

/** A page of a network's complaints by due date, never with personal data. */
export async function listCases(
  network: NetworkRow,
  settings: NetworkSettings,
  filter: ComplaintListFilter & { limit: number; cursor: number[] | null },
  now: Date,
): Promise<ComplaintPage> {
  const { cursor, limit, ...rest } = filter;
  const rows = await listComplaints(network.id, { ...rest, after: afterOf(cursor), limit: limit + 1 });
  const today = localDateAt(Math.floor(now.getTime() / 1000), settings.timeZone);
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  return {
    items: items.map((row) => complaintView(row, today)),
    next: rows.length > limit && last ? [Number(last.dueOn.replaceAll('-', '')), last.id] : null,
  };
}

/** How many of a network's complaints stand where today. */
export function countCases(
  network: NetworkRow,
  settings: NetworkSettings,
  now: Date,
): Promise<ComplaintCounts> {
  return countByStatus(network.id, localDateAt(Math.floor(now.getTime() / 1000), settings.timeZone));
}

function afterOf(cursor: number[] | null): ComplaintFilter['after'] {
  if (!cursor) return undefined;
  const digits = String(cursor[0] ?? 0).padStart(8, '0');
  const dueOn = `${digits.slice(0, 4)}-${digits.slice(4, 6)}-${digits.slice(6, 8)}`;
  return { dueOn, id: cursor[1] ?? 0 };
}
