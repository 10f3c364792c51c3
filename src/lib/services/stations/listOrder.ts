import { TROUBLE_KINDS } from '#lib/contracts/health';
import { type StationColumnKey, type StationListChoice } from '#lib/contracts/stationList';
import { type StationState } from '#lib/contracts/stations';
import { listCell } from './listCells';
import { type StationListRow } from './listRow';

type Key = string | number | boolean | null;

/** What needs a look comes first. */
const STATE_ORDER: readonly StationState[] = ['silent', 'awaiting', 'live', 'retired'];

/** Orders stations by a column; without a value last either way, like ones by code. */
export function compareStations({ column, isDescending }: StationListChoice['sort']) {
  const sign = isDescending ? -1 : 1;
  return (a: StationListRow, b: StationListRow): number =>
    compareKeys(sortKey(a, column), sortKey(b, column), sign) ||
    compareKeys(a.station.code, b.station.code, 1);
}

function sortKey(row: StationListRow, column: StationColumnKey): Key {
  if (column === 'state') return STATE_ORDER.indexOf(row.station.state);
  if (column === 'troubles') return worstOf(row);
  if (column === 'bands') return row.station.firstBandHz;
  return listCell(row, column);
}

function worstOf({ troubles }: StationListRow): number | null {
  return troubles.length === 0 ? null : Math.min(...troubles.map((kind) => TROUBLE_KINDS.indexOf(kind)));
}

function compareKeys(a: Key, b: Key, sign: number): number {
  if (a === null || b === null) return (a === null ? 1 : 0) - (b === null ? 1 : 0);
  if (typeof a === 'number' && typeof b === 'number') return sign * (a - b);
  return sign * String(a).localeCompare(String(b), 'en', { numeric: true });
}
