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
import { keptFromSecOf } from '../retention/kept';
import { bandColumns, inDb, type BandColumns } from './columns';

export interface IntervalPage {
  list: Omit<IntervalList, 'next'>;
  /** Start of the first interval that is left for the next page. */
  nextStartSec: number | null;
}

/**
 * Intervals of a station that begin in `fromSec <= t < toSec`, as stored, at most `limit`, with why each does not count. A page
 * ends where octaves follow on thirds, so that one list of bands names the levels of all its intervals.
 */
export async function listIntervals(
  station: StationRow,
  period: { fromSec: number; toSec: number },
  limit: number,
): Promise<IntervalPage> {
  // One more than the page for where the next begins, one for an interval that begins before the period.
  const overlapping = await selectIntervals(station.id, period.fromSec, period.toSec, pool(), limit + 2);
  const beginning = overlapping.filter(({ startSec }) => startSec >= period.fromSec);
  const fraction = beginning[0]?.bandFraction ?? station.bandFraction;
  const otherAt = beginning.findIndex(({ bandFraction }) => bandFraction !== fraction);
  const page = beginning.slice(0, otherAt < 0 ? limit : Math.min(otherAt, limit));
  const columns = bandColumns(
    fraction,
    page.map(({ bandIndices }) => bandIndices),
  );
  const timeline = await listSettings(station.networkId);
  const judgement = await judgementOf({ station, timeline, validity: 'rules' }, period, pool());
  const keptFromSec = await keptFromSecOf(station.id, pool());
  return {
    list: {
      bands: columns.nominalHz,
      items: page.map((interval) => itemOf(interval, columns, judgement)),
      keptFrom: period.fromSec < keptFromSec ? formatInstantUtc(keptFromSec) : null,
    },
    nextStartSec: beginning[page.length]?.startSec ?? null,
  };
}

function itemOf(interval: StoredInterval, columns: BandColumns, judgement: Judgement) {
  const { startSec, durationSec, flags } = interval;
  return {
    start: formatInstantUtc(startSec),
    seconds: durationSec,
    LAeq: interval.laeqCentiDb / 100,
    isLAeqComputed: (flags & FLAGS.laeqComputed) !== 0,
    LAFmax: inDb(interval.lafmaxCentiDb),
    LAFmin: inDb(interval.lafminCentiDb),
    LCeq: inDb(interval.lceqCentiDb),
    LCpeak: inDb(interval.lcpeakCentiDb),
    levels: columns.levelsOf(interval),
    flags: flagNames(flags),
    windSpeed: interval.windSpeedMs,
    windDirection: interval.windDirectionDeg,
    temperature: interval.temperatureC,
    battery: interval.batteryV,
    validity: reasonsOf(interval, judgement),
  };
}

/** Why an interval does not count under the rules at its start. */
function reasonsOf(interval: StoredInterval, judgement: Judgement) {
  const { startSec, durationSec } = interval;
  const [span] = rulesSpans(startSec, startSec + durationSec, judgement.timeline);
  const reasonBits = span ? reasonBitsOf(interval, span.rules, judgement) : 0;
  return INVALIDITY_REASONS.filter((_, bit) => (reasonBits & (1 << bit)) !== 0);
}
