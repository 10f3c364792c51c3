import { type ClockEpisode } from '#db/queries/clockShifts';
import { type Connection } from '#db/queries/connection';
import { selectStandingExclusions } from '#db/queries/exclusions';
import { selectMeasuredIntervals } from '#db/queries/measuredIntervals';
import { type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { type WindRule } from '#lib/acoustics/windRule';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { keptFromSecOf, requireKept } from '../retention/kept';
import { weatherAtStation } from '../weather/stationWeather';
import { sumSealedQuarters } from './sealedQuarters';
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

/** Whether what counts of a source is what its stored quarter-hours count. */
function isAsStored({ validity, alsoExcluded, wind, moved }: LevelSource): boolean {
  return validity === 'rules' && !alsoExcluded && !wind && !moved;
}

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

/**
 * Sums of a period straight from its intervals; where these are no longer kept, of the quarter-hours that it touches, which have no
 * distributions per band.
 * @throws {SealedError} for what only intervals tell of time before they are kept.
 */
export async function sumIntervals(
  source: LevelSource,
  asked: Span,
  options: { bandClasses: boolean },
  conn: Connection,
): Promise<PeriodAccumulator> {
  const whole = new PeriodAccumulator(options);
  const keptFromSec = await keptFromSecOf(source.station.id, conn);
  const period = { fromSec: Math.max(asked.fromSec, keptFromSec), toSec: asked.toSec };
  if (asked.fromSec < keptFromSec) {
    if (!isAsStored(source)) requireKept(asked.fromSec, keptFromSec);
    const sealed = { fromSec: asked.fromSec, toSec: Math.min(asked.toSec, keptFromSec) };
    whole.merge(await sumSealedQuarters(source.station.id, sealed, conn));
    if (asked.toSec <= keptFromSec) return whole;
  }
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
