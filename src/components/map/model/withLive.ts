import type { LiveInterval } from '#lib/contracts/live';
import type { Station } from '#lib/contracts/stations';

/**
 * The stations with what they have just measured, the last of each counting; a station that is not among them yet comes with the next
 * answer. One that tells what is known already stays the same object, and so does the list where all do.
 */
export function withLive(stations: Station[], intervals: readonly LiveInterval[]): Station[] {
  const told = new Map(intervals.map((interval) => [interval.code, interval]));
  const renewed = stations.map((station) => {
    const interval = told.get(station.code);
    return interval === undefined || isKnown(station, interval) ? station : measured(station, interval);
  });
  return renewed.every((station, at) => station === stations[at]) ? stations : renewed;
}

function measured(station: Station, { code, state, ...latest }: LiveInterval): Station {
  return { ...station, code, state, latest };
}

function isKnown({ state, latest }: Station, told: LiveInterval): boolean {
  return state === told.state && latest?.start === told.start && latest.receivedAt === told.receivedAt;
}
