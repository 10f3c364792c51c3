import type { StationListChoice } from '#lib/contracts/stationList';
import { badRequest, problemResponse } from '#lib/http/problem';
import { csv } from '#lib/http/respond';
import { stationListCsv } from '#lib/services/stations/listCsv';
import type { StationListRow } from '#lib/services/stations/listRow';

interface Shown {
  rows: readonly StationListRow[];
  choice: StationListChoice;
  period: { fromSec: number; toSec: number };
}

/** The list as the page shows it, as a file: `format` is `csv`. A period that the page could not read is refused, never replaced. */
export function stationListFile(
  { rows, choice, period }: Shown,
  { format, problem, slug }: { format: string; problem: string | null; slug: string },
): Response {
  if (problem !== null) return problemResponse(badRequest(problem));
  if (format !== 'csv') return problemResponse(badRequest('`format` must be csv.'));
  return csv(stationListCsv(rows, choice.columns, period), `${slug}-stations.csv`);
}
