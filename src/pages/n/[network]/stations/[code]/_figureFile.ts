import type { FigureSheet } from '#lib/contracts/figureSheet';
import { badRequest, problemResponse } from '#lib/http/problem';
import { csv, json } from '#lib/http/respond';
import { sheetCsv } from '#lib/services/figures/sheetCsv';

/** What the page shows as a file: `format` is `csv` or `json`. A period that the page could not read is refused, never replaced. */
export function figureFile(
  sheet: FigureSheet | null,
  { format, problem }: { format: string; problem: string | null },
): Response {
  if (problem !== null) return problemResponse(badRequest(problem));
  if (!sheet) return problemResponse(badRequest('Figures are given of a year at most.'));
  if (format === 'json') return json(sheet);
  if (format !== 'csv') return problemResponse(badRequest('`format` must be csv or json.'));
  return csv(sheetCsv(sheet), `${sheet.network}-${sheet.station.code}-figures.csv`);
}
