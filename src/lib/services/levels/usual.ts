import { pool, type Connection } from '#db/queries/connection';
import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import { type StationRow } from '#db/queries/stations';
import { bandsOf, type BandFraction } from '#lib/acoustics/bands';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { addDays, instantAtSec, localDateAt, localMinuteAt } from '#lib/time/zone';
import { periodFigures } from './figures';
import { quantile } from './quantile';
import { type Span } from './spans';

/** What is usual at a station for a clock window: LAeq of the same weekday and window in the weeks before. */
export interface Usual {
  weeks: number;
  /** How many of these weeks had enough valid data; only they count. */
  validWeeks: number;
  /** LAeq of each of these, the latest first. */
  levelsDb: number[];
  medianDb: number | null;
  /** 10 % and 90 % points (linear interpolation between order statistics, "type 7"). */
  lowDb: number | null;
  highDb: number | null;
  /** Median of each band's Leq over the weeks that count, where it had a level in any; thirds, or octaves of an octave station. */
  bands: UsualBand[];
  /** The same of octaves. */
  octaves: UsualBand[];
}

export interface UsualBand {
  nominalHz: number;
  medianDb: number;
}

export interface UsualQuery {
  station: Pick<StationRow, 'id' | 'networkId' | 'intervalSec'>;
  window: Span;
  /** How many weeks before are looked at; 8 is Bittern's definition. */
  weeks?: 4 | 8;
  /** The network's settings in order of their beginning; read when left out. */
  timeline?: NetworkSettings[];
}

/** The usual LAeq of a window. Null levels when no week before had enough valid data. */
export async function usualFor(query: UsualQuery, conn: Connection = pool()): Promise<Usual> {
  const { station, window, weeks = 8 } = query;
  const timeline = query.timeline ?? (await listSettings(station.networkId, conn));
  const { timeZone } = pickSettings(timeline, window.fromSec);
  const counted: PeriodAccumulator[] = [];
  for (let week = 1; week <= weeks; week += 1) {
    const span = weeksBefore(window, week, timeZone);
    const { levels, meetsMinimum } = await periodFigures({ station, timeline, ...span }, {}, conn);
    if (meetsMinimum && levels.laeqDb() !== null) counted.push(levels);
  }
  const levelsDb = counted.flatMap((levels) => levels.laeqDb() ?? []);
  return {
    weeks,
    validWeeks: levelsDb.length,
    levelsDb,
    medianDb: quantile(levelsDb, 0.5),
    lowDb: quantile(levelsDb, 0.1),
    highDb: quantile(levelsDb, 0.9),
    bands: bandMedians(counted, fractionOf(counted), (levels, index) => levels.bandLeqDb(index)),
    octaves: bandMedians(counted, 1, (levels, index) => levels.octaveLeqDb(index)),
  };
}

function fractionOf(counted: readonly PeriodAccumulator[]): BandFraction {
  return counted[0]?.sums.bandFraction ?? 3;
}

function bandMedians(
  counted: readonly PeriodAccumulator[],
  fraction: BandFraction,
  leqDb: (levels: PeriodAccumulator, index: number) => number | null,
): UsualBand[] {
  return bandsOf(fraction).flatMap(({ index, nominalHz }) => {
    const medianDb = quantile(
      counted.flatMap((levels) => leqDb(levels, index) ?? []),
      0.5,
    );
    return medianDb === null ? [] : [{ nominalHz, medianDb }];
  });
}

/** The window some weeks earlier by the clock on the wall, whatever clock change lies between. */
export function weeksBefore(window: Span, weeks: number, timeZone: string): Span {
  const shifted = (sec: number) =>
    instantAtSec(addDays(localDateAt(sec, timeZone), -7 * weeks), localMinuteAt(sec, timeZone), timeZone) +
    (sec % 60);
  const fromSec = shifted(window.fromSec);
  const toSec = shifted(window.toSec);
  // The autumn change repeats an hour: a window across it may end on the wall before it begins. Then its length holds.
  return { fromSec, toSec: toSec > fromSec ? toSec : fromSec + window.toSec - window.fromSec };
}
