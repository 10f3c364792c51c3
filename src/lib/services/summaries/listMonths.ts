import { listSettings, type NetworkRow } from '#db/queries/networks';
import { listStations } from '#db/queries/stations';
import { listStationMonths } from '#db/queries/summaries';
import { SUMMARY_FORMATS, type SummaryMonth } from '#lib/contracts/summaries';
import { monthStandings } from './life/states';
import { monthSpan, stoodWithin } from './monthSpan';

/**
 * Months in which some station of the network has data, latest first, with each station's coverage: its valid time over what
 * has elapsed of the days, evenings and nights that begin in the month. Stations without data in a month are listed with 0.
 * `within` keeps the months that overlap a period.
 */
export async function listMonths(
  network: NetworkRow,
  now: Date,
  within: { fromSec: number; toSec: number } | null = null,
): Promise<SummaryMonth[]> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const [timeline, stations, found, standingOf] = await Promise.all([
    listSettings(network.id),
    listStations(network.id),
    listStationMonths(network.id),
    monthStandings(network.id),
  ]);
  const months = [...new Set(found.map(({ month }) => month))].map((month) => monthSpan(month, timeline));
  const wanted = months.filter(
    ({ fromSec, toSec }) => within === null || (fromSec < within.toSec && within.fromSec < toSec),
  );
  return wanted.map((span) => {
    const { month } = span;
    const elapsedSec = Math.max(0, Math.min(span.lastNightEndSec, nowSec) - span.firstDayStartSec);
    const listed = stations.filter(
      (station) =>
        found.some((row) => row.month === month && row.stationId === station.id) ||
        stoodWithin(station, span),
    );
    return {
      month,
      isToDate: nowSec < span.lastNightEndSec,
      formats: [...SUMMARY_FORMATS],
      ...standingOf(month, nowSec >= span.lastNightEndSec),
      stations: listed.map(({ id, code }) => {
        const validSec = found.find((row) => row.month === month && row.stationId === id)?.validSec ?? 0;
        return { code, coverage: elapsedSec === 0 ? 0 : Math.min(1, validSec / elapsedSec) };
      }),
    };
  });
}
