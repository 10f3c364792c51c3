import { formatInstantUtc } from '#lib/contracts/common';
import { STATION_COLUMNS, type StationColumnKey } from '#lib/contracts/stationList';
import { type Span } from '../levels/spans';
import { csvText } from '#lib/format/csvText';
import { listCell } from './listCells';
import { type StationListRow } from './listRow';

/** A list of stations as it is shown, one line a station: its columns, its order; each with its code and the figures' period. */
export function stationListCsv(
  rows: readonly StationListRow[],
  columns: readonly StationColumnKey[],
  { fromSec, toSec }: Span,
): string {
  const headings = columns.map((key) => {
    const { label, unit } = STATION_COLUMNS[key];
    return unit ? `${label} (${unit})` : label;
  });
  const period = [formatInstantUtc(fromSec), formatInstantUtc(toSec)];
  return csvText([
    ['Code', ...headings, 'From', 'To'],
    ...rows.map((row) => [row.station.code, ...columns.map((key) => listCell(row, key)), ...period]),
  ]);
}
