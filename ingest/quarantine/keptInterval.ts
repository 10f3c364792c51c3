import { bandAt } from '#lib/acoustics/bands';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { FLAGS, flagNames } from '#lib/acoustics/validity';
import { formatInstantUtc } from '#lib/contracts/common';
import { type StoredInterval } from '#db/queries/intervals';

const inDb = (centiDb: number | null) => (centiDb === null ? null : centiDb / 100);

/** A stored interval as a record that a monitor could have sent: read again it gives the same interval. */
export function keptInterval(interval: StoredInterval): string {
  const { bandFraction, bandIndices, levelsCentiDb, flags } = interval;
  const isLaeqComputed = (flags & FLAGS.laeqComputed) !== 0;
  return JSON.stringify({
    bands: Array.from(bandIndices, (index) => bandAt(bandFraction, index).nominalHz),
    interval: {
      start: formatInstantUtc(interval.startSec),
      seconds: interval.durationSec,
      ...(isLaeqComputed ? {} : { LAeq: interval.laeqCentiDb / 100 }),
      LAFmax: inDb(interval.lafmaxCentiDb),
      LAFmin: inDb(interval.lafminCentiDb),
      LCeq: inDb(interval.lceqCentiDb),
      LCpeak: inDb(interval.lcpeakCentiDb),
      levels: Array.from(levelsCentiDb, (level) => (level === NO_LEVEL_CENTI_DB ? null : level / 100)),
      flags: flagNames(flags),
      windSpeed: interval.windSpeedMs,
      windDirection: interval.windDirectionDeg,
      temperature: interval.temperatureC,
      battery: interval.batteryV,
    },
  });
}
