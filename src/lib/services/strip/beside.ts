import { findStation, type StationRow } from '#db/queries/stations';
import { type Span } from '#lib/services/levels/spans';
import { parseUrlInstant } from '#lib/time/urlPeriod';

/** What is shown under a station's strip, on the same axis. */
export interface Beside {
  station: StationRow;
  /** How much later its time is than the axis's. */
  shiftSec: number;
}

export interface BesideQuery {
  /** The page's station. */
  station: StationRow;
  period: Span;
  zone: string;
  /** `with`: another station's code; `against`: a month, date or instant that another period begins at. */
  params: URLSearchParams;
}

/** What the address asks to be shown under the strip, if anything, or in words why that cannot be. */
export interface BesideAnswer {
  beside: Beside | null;
  problem: string | null;
}

const MONTH = /^\d{4}-\d{2}$/;

/**
 * Reads `?with=MER-03` (another station of the network) and `?against=2026-10` (another period, as long as the page's, from
 * that month's, date's or instant's beginning); both together: the other station in the other period.
 */
export async function readBeside({ station, period, zone, params }: BesideQuery): Promise<BesideAnswer> {
  const [code, against] = [params.get('with') ?? '', params.get('against') ?? ''];
  const other = code === '' ? station : await findStation(station.networkId, code);
  if (!other) return refusal(`The network has no station ${code} to show beside this one.`);
  const startSec = against === '' ? period.fromSec : beginningOf(against, zone);
  if (startSec === null) {
    return refusal('The other period could not be read: name a month (2026-10), a date or an instant.');
  }
  const beside = { station: other, shiftSec: startSec - period.fromSec };
  return { beside: isItself(beside, station) ? null : beside, problem: null };
}

function isItself(beside: Beside, station: StationRow): boolean {
  return beside.station.id === station.id && beside.shiftSec === 0;
}

function beginningOf(text: string, zone: string): number | null {
  return parseUrlInstant(MONTH.test(text) ? `${text}-01` : text, zone);
}

function refusal(problem: string): BesideAnswer {
  return { beside: null, problem };
}
