import { pool } from '#db/queries/connection';
import { selectIntervals } from '#db/queries/intervals';
import type { LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { EVENT_METRICS } from '#lib/acoustics/limitQuantities';
import { formatInstantUtc } from '#lib/contracts/common';
import { MOST_LISTED_EVENTS, type WindowEvents } from '#lib/contracts/exceedanceDetail';
import { csvText } from '#lib/format/csvText';
import { judgementOf } from '../levels/intervalSums';
import type { Span } from '../levels/spans';
import { eventRulesOf, eventsOf } from '../limits/intervalMeasures';

/** The events of a window by the limit on events that judges it, from the data as they are now; null of a limit on anything else. */
export async function windowEvents(
  version: LimitVersion,
  station: StationRow,
  window: Span,
  timeline: NetworkSettings[],
): Promise<WindowEvents | null> {
  if (!EVENT_METRICS.includes(version.metric)) return null;
  const source = { station, timeline, validity: 'rules' as const, wind: version.windRule };
  const [judgement, intervals] = await Promise.all([
    judgementOf(source, window, pool()),
    selectIntervals(station.id, window.fromSec, window.toSec),
  ]);
  const events = eventsOf(intervals, window, judgement, eventRulesOf(version));
  return {
    count: events.length,
    items: events.slice(0, MOST_LISTED_EVENTS).map(({ fromSec, toSec, figures }) => ({
      from: formatInstantUtc(fromSec),
      to: formatInstantUtc(toSec),
      seconds: toSec - fromSec,
      LAE: figures.laeDb(),
      LAFmax: figures.sums.lafmaxCentiDb === null ? null : figures.sums.lafmaxCentiDb / 100,
      LAeq: figures.laeqDb(),
    })),
  };
}

/** The events as CSV, in order of time. */
export function eventsCsv(station: string, { items }: WindowEvents): string {
  return csvText([
    ['station', 'from', 'to', 'seconds', 'LAE', 'LAFmax', 'LAeq'],
    ...items.map(({ from, to, seconds, LAE, LAFmax, LAeq }) => [
      station,
      from,
      to,
      seconds,
      LAE,
      LAFmax,
      LAeq,
    ]),
  ]);
}
