import { listExceedances, type ExceedanceFilter } from '#db/queries/exceedances';
import type { Exceedance } from '#lib/contracts/exceedances';
import { csvText, type Cell } from '#lib/format/csvText';
import { exceedanceView } from './view';

/** Most rows of one file. */
export const MOST_CSV_EXCEEDANCES = 50_000;

const COLUMNS: [heading: string, cell: (exceedance: Exceedance) => Cell][] = [
  ['id', ({ id }) => id],
  ['station', ({ station }) => station],
  ['stationName', ({ stationName }) => stationName],
  ['limitId', ({ limit }) => limit.id],
  ['limitVersion', ({ limit }) => limit.version],
  ['limit', ({ limit }) => limit.name],
  ['descriptor', ({ descriptor }) => descriptor],
  ['from', ({ from }) => from],
  ['to', ({ to }) => to],
  ['loudestFrom', ({ loudest }) => loudest?.from ?? null],
  ['loudestTo', ({ loudest }) => loudest?.to ?? null],
  ['unit', ({ unit }) => unit],
  ['level', ({ level }) => level],
  ['threshold', ({ threshold }) => threshold],
  ['excess', ({ excess }) => excess],
  ['coverage', ({ coverage }) => coverage],
  ['state', ({ state }) => state],
  ['revision', ({ revision }) => revision],
  ['detectedAt', ({ detectedAt }) => detectedAt],
  ['revisedAt', ({ revisedAt }) => revisedAt],
  ['acknowledgedAt', ({ acknowledgement }) => acknowledgement?.at ?? null],
  ['acknowledgedBy', ({ acknowledgement }) => acknowledgement?.by ?? null],
  ['cause', ({ acknowledgement }) => acknowledgement?.cause ?? null],
  ['causeDetail', ({ acknowledgement }) => acknowledgement?.causeDetail ?? null],
  ['note', ({ acknowledgement }) => acknowledgement?.note ?? null],
];

/** The whole list of a filter as CSV, in its order; null when it has more than `MOST_CSV_EXCEEDANCES`. */
export async function exceedancesCsv(networkId: number, filter: ExceedanceFilter): Promise<string | null> {
  const rows = await listExceedances(networkId, filter, { limit: MOST_CSV_EXCEEDANCES + 1, after: null });
  if (rows.length > MOST_CSV_EXCEEDANCES) return null;
  const headings = COLUMNS.map(([heading]) => heading);
  return csvText([
    headings,
    ...rows.map((row) => {
      const exceedance = exceedanceView(row);
      return COLUMNS.map(([, cell]) => cell(exceedance));
    }),
  ]);
}
