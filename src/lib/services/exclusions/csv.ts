import { listExclusions, type ExclusionListQuery } from '#db/queries/exclusions';
import { type Exclusion } from '#lib/contracts/exclusions';
import { csvText, type Cell } from '#lib/format/csvText';
import { exclusionJson } from './exclusionJson';

/** Most rows of one file. */
export const MOST_CSV_EXCLUSIONS = 50_000;

const COLUMNS: [heading: string, cell: (exclusion: Exclusion) => Cell][] = [
  ['id', ({ id }) => id],
  ['act', ({ act }) => act],
  ['station', ({ station }) => station],
  ['from', ({ from }) => from],
  ['to', ({ to }) => to],
  ['reason', ({ reason }) => reason],
  ['createdAt', ({ createdAt }) => createdAt],
  ['createdBy', ({ createdBy }) => createdBy],
  ['withdrawnAt', ({ withdrawal }) => withdrawal?.at ?? null],
  ['withdrawnBy', ({ withdrawal }) => withdrawal?.by ?? null],
  ['withdrawnBecause', ({ withdrawal }) => withdrawal?.reason ?? null],
];

/** The whole list of a filter as CSV, in its order; null when it has more than `MOST_CSV_EXCLUSIONS`. */
export async function exclusionsCsv(
  query: Omit<ExclusionListQuery, 'after' | 'limit'>,
): Promise<string | null> {
  const rows = await listExclusions({ ...query, limit: MOST_CSV_EXCLUSIONS + 1, after: null });
  if (rows.length > MOST_CSV_EXCLUSIONS) return null;
  const exclusions = rows.map(exclusionJson);
  return csvText([
    COLUMNS.map(([heading]) => heading),
    ...exclusions.map((exclusion) => COLUMNS.map(([, cell]) => cell(exclusion))),
  ]);
}
