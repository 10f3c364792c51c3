import type { LiveInterval } from '#lib/contracts/live';
import type { Station } from '#lib/contracts/stations';

/** The stations with what one of them has just measured; a station that is not among them yet comes with the next answer. */
export function withLive(stations: Station[], { code, state, ...latest }: LiveInterval): Station[] {
  return stations.map((station) => (station.code === code ? { ...station, state, latest } : station));
}
