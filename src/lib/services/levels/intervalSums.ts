import { type ClockEpisode } from '#db/queries/clockShifts';
import { type Connection } from '#db/queries/connection';
import { selectStandingExclusions } from '#db/queries/exclusions';
import { selectMeasuredIntervals } from '#db/queries/measuredIntervals';
import { type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { type WindRule } from '#lib/acoustics/windRule';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { weatherAtStation } from '../weather/stationWeather';
import { accumulate, type Judgement, type Validity } from './accumulate';
import { mergedSpans, type Span } from './spans';

/** Whose intervals are summed and what decides which count. */
export interface LevelSource {
  station: Pick<StationRow, 'id' | 'intervalSec'>;
  /** The network's settings in order of their beginning. */
  timeline: NetworkSettings[];
  validity: Validity;
  /** Counted as if these were excluded, too: what figures would become. Nothing is stored of them. */
  alsoExcluded?: readonly Span[];
  /** Only intervals with this wind count: for limits that go by it. Nothing is stored of them. */
  wind?: WindRule | null;
  /** Counted as if this episode of a wrong clock were moved. Nothing is stored of it. */
  moved?: ClockEpisode;
}

/** Intervals that are held in memory at once: a month of minutes, half a day of seconds. */
export const MOST_INTERVALS = 45_000;

/** What decides which intervals of a period count: settings and standing exclusions. */
export async function judgementOf(
  { station, timeline, validity, alsoExcluded = [], wind = null }: LevelSource,
  { fromSec, toSec }: Span,
  conn: Connection,
): Promise<Judgement> {
  if (validity === 'all') {
    return { validity, timeline, exclusions: mergedSpans(alsoExcluded), weather: null };
  }
  // An interval that reaches into the period may begin, or end, up to an hour outside it.
  const reach = { fromSec: fromSec - 3600, toSec: toSec + 3600 };
  const [exclusions, weather] = await Promise.all([
    selectStandingExclusions(station.id, reach.fromSec, reach.toSec, conn),
    weatherAtStation(station.id, reach, conn),
  ]);
  return { validity, timeline, exclusions: mergedSpans([...exclusions, ...alsoExcluded]), weather, wind };
}

/** Sums of a period straight from its intervals. */
export async function sumIntervals(
  source: LevelSource,
  period: Span,
  options: { bandClasses: boolean },
  conn: Connection,
): Promise<PeriodAccumulator> {
  const whole = new PeriodAccumulator(options);
  const stepSec = MOST_INTERVALS * source.station.intervalSec;
  const partAt = (fromSec: number) => ({ fromSec, toSec: Math.min(fromSec + stepSec, period.toSec) });
  const read = (part: Span) => selectMeasuredIntervals(source.station.id, part.fromSec, part.toSec, conn);
  const [judgement, first] = await Promise.all([
    judgementOf(source, period, conn),
    read(partAt(period.fromSec)),
  ]);
  for (let { fromSec } = period; fromSec < period.toSec; fromSec += stepSec) {
    const part = partAt(fromSec);
    const intervals = fromSec === period.fromSec ? first : await read(part);
    whole.merge(accumulate(intervals, part, judgement, options));
  }
  return whole;
}
