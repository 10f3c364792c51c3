import { type CoverageDay } from '#lib/contracts/health';
import { csvText } from '#lib/format/csvText';
import { type NetworkHealth } from './now';

/** How the stations are now, one line a station. */
export function healthCsv({ stations, troubles }: NetworkHealth): string {
  const header = [
    'station',
    'name',
    'state',
    'newestEnd',
    'lastPost',
    'received24h',
    'batteryV',
    'clockAheadSeconds',
    'troubles',
    'worstSince',
  ];
  const rows = stations.map((one) => [
    one.station,
    one.name,
    one.state,
    one.newestEnd,
    one.lastPost,
    Number(one.received24h.toFixed(4)),
    one.battery,
    one.clockAhead,
    one.troubles.join(' '),
    troubles.find(({ station }) => station === one.station)?.since ?? null,
  ]);
  return csvText([header, ...rows]);
}

/** Coverage of each local day, one line a day. */
export function coverageCsv(days: readonly CoverageDay[]): string {
  const header = ['date', 'elapsedSeconds', 'validSeconds', 'excludedSeconds', 'coverage'];
  const rows = days.map((day) => [
    day.date,
    day.elapsedSeconds,
    day.validSeconds,
    day.excludedSeconds,
    day.coverage === null ? null : Number(day.coverage.toFixed(4)),
  ]);
  return csvText([header, ...rows]);
}
