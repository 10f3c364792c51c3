import { formatInstantUtc } from '#lib/contracts/common';
import { parseUrlInstant } from '#lib/time/urlPeriod';

const LATEST_SEC = 4_294_967_295;

/** What of the exclusions a list shows. */
export interface ExclusionView {
  /** Code; null: of every station. */
  station: string | null;
  fromSec: number;
  toSec: number;
  /** What of the address could not be used, in words. */
  problem: string | null;
  /** The same as query of the interface; empty for everything. */
  interfaceQuery: string;
}

/** Reads which exclusions the address of the list asks for; what cannot be read is left out and said. */
export function readView(url: URL, zone: string, codes: ReadonlySet<string>): ExclusionView {
  const given = (name: string) => url.searchParams.get(name) || null;
  const [askedStation, askedFrom, askedTo] = [given('station'), given('from'), given('to')];
  const station = askedStation !== null && codes.has(askedStation) ? askedStation : null;
  const from = askedFrom === null ? null : parseUrlInstant(askedFrom, zone);
  const to = askedTo === null ? null : parseUrlInstant(askedTo, zone);
  const isTurned = from !== null && to !== null && from >= to;
  const problems = [
    station !== askedStation && 'The network has no such station: all are shown.',
    ((from === null && askedFrom !== null) || (to === null && askedTo !== null)) &&
      'A time could not be read and is left out.',
    isTurned && 'The period ends before it begins: exclusions of any time are shown.',
  ].filter((words) => words !== false);
  const period = isTurned ? { from: null, to: null } : { from, to };
  const query = new URLSearchParams();
  if (station !== null) query.set('station', station);
  if (period.from !== null) query.set('from', formatInstantUtc(period.from));
  if (period.to !== null) query.set('to', formatInstantUtc(period.to));
  return {
    station,
    fromSec: period.from ?? 0,
    toSec: period.to ?? LATEST_SEC,
    problem: problems.length > 0 ? problems.join(' ') : null,
    interfaceQuery: query.size > 0 ? `?${query.toString()}` : '',
  };
}
