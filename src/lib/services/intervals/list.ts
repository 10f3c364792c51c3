import { pool } from '#db/queries/connection';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { listSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import { INVALIDITY_REASONS, FLAGS, flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import type { IntervalList } from '#lib/contracts/intervals';
import { rulesSpans, type Judgement } from '../levels/accumulate';
import { judgementOf } from '../levels/intervalSums';
import { reasonBitsOf } from '../levels/seen';
import { bandIndicesOf, hasMixedFractions, inDb, levelsIn, nominalHzOf } from './columns';

export interface IntervalPage {
  list: Omit<IntervalList, 'next'>;
  /** Start of the first interval that is left for the next page. */
  nextStartSec: number | null;
}

/** A period mixes octaves and thirds. */
export class MixedBandFractions extends Error {
  constructor() {
    super('The period holds octave and one-third-octave intervals; ask for the two stretches apart.');
    this.name = 'MixedBandFractions';
  }
}

/**
 * Intervals of a station that begin in `fromSec <= t < toSec`, as stored, at most `limit`, with why each does not count.
 * @throws {MixedBandFractions}
 */
export async function listIntervals(
  station: StationRow,
  period: { fromSec: number; toSec: number },
  limit: number,
): Promise<IntervalPage> {
  const overlapping = await selectIntervals(station.id, period.fromSec, period.toSec, pool(), limit + 2);
  const beginning = overlapping.filter(({ startSec }) => startSec >= period.fromSec);
  const page = beginning.slice(0, limit);
  if (hasMixedFractions(page)) throw new MixedBandFractions();
  const timeline = await listSettings(station.networkId);
  const judgement = await judgementOf({ station, timeline, validity: 'rules' }, period, pool());
  const indices = bandIndicesOf(page);
  return {
    list: {
      bands: nominalHzOf(page, indices),
      items: page.map((interval) => itemOf(interval, indices, judgement)),
    },
    nextStartSec: beginning[limit]?.startSec ?? null,
  };
}

function itemOf(interval: StoredInterval, indices: readonly number[], judgement: Judgement) {
  const { startSec, durationSec, flags } = interval;
  const [span] = rulesSpans(startSec, startSec + durationSec, judgement.timeline);
  const reasonBits = span ? reasonBitsOf(interval, span.rules, judgement) : 0;
  return {
    start: formatInstantUtc(startSec),
    seconds: durationSec,
    LAeq: interval.laeqCentiDb / 100,
    isLAeqComputed: (flags & FLAGS.laeqComputed) !== 0,
    LAFmax: inDb(interval.lafmaxCentiDb),
    LAFmin: inDb(interval.lafminCentiDb),
    LCeq: inDb(interval.lceqCentiDb),
    LCpeak: inDb(interval.lcpeakCentiDb),
    levels: levelsIn(interval, indices),
    flags: flagNames(flags),
    windSpeed: interval.windSpeedMs,
    windDirection: interval.windDirectionDeg,
    temperature: interval.temperatureC,
    battery: interval.batteryV,
    leftOut: INVALIDITY_REASONS.filter((_, bit) => (reasonBits & (1 << bit)) !== 0),
  };
}
