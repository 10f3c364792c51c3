import { bandRange } from '#lib/acoustics/bands';
import { formatInstantUtc } from '#lib/contracts/common';
import { Random } from './random';

export const BANDS_HZ = bandRange(3, 20, 20_000).map(({ nominalHz }) => nominalHz);

/** What a monitor gives its sender at a minute of the data. */
export interface Given {
  minute: number;
  records: unknown[];
  /** A post that nobody can read goes before them. */
  isGarbled: boolean;
}

/** How often, of a station's minutes. */
const CHANCES = {
  lost: 0.005,
  late: 0.04,
  duplicate: 0.04,
  conflicting: 0.01,
  overlapping: 0.005,
  corrupt: 0.02,
  garbled: 0.01,
};
const LATEST_MIN = 20;

/**
 * What a station's monitor sends over some minutes, the same for the same seed: a record a minute, some of them late and so out of
 * order, sent twice, altered, overlapping or corrupt.
 */
export function givenBy(seed: number, station: number, firstSec: number, minutes: number): Given[] {
  const random = new Random(seed * 1_000_003 + station);
  const given: Given[] = Array.from({ length: minutes + LATEST_MIN + 1 }, (_, minute) => ({
    minute,
    records: [],
    isGarbled: random.isBelow(CHANCES.garbled),
  }));
  const loudness = random.between(48, 66);
  for (let minute = 0; minute < minutes; minute += 1) {
    if (random.isBelow(CHANCES.lost)) continue;
    const record = recordOf(random, firstSec + minute * 60, loudness);
    const later = (most: number) => given[minute + random.whole(0, most)]?.records;
    const sentAt = random.isBelow(CHANCES.late) ? minute + random.whole(1, LATEST_MIN) : minute;
    given[sentAt]?.records.push(record);
    if (random.isBelow(CHANCES.duplicate)) later(LATEST_MIN)?.push(record);
    if (random.isBelow(CHANCES.conflicting)) {
      later(LATEST_MIN)?.push({ ...record, LAeq: record.LAeq + random.whole(1, 90) / 10 });
    }
    if (random.isBelow(CHANCES.overlapping)) {
      later(3)?.push({ ...record, start: formatInstantUtc(firstSec + minute * 60 + 30) });
    }
    if (random.isBelow(CHANCES.corrupt)) later(3)?.push(corrupt(random, record));
  }
  return given.filter(({ records, isGarbled }) => records.length > 0 || isGarbled);
}

type InventedRecord = ReturnType<typeof recordOf>;

function recordOf(random: Random, startSec: number, loudness: number) {
  const LAeq = Math.round((loudness + random.between(-6, 6)) * 10) / 10;
  return {
    start: formatInstantUtc(startSec),
    seconds: 60,
    LAeq,
    LAFmax: LAeq + random.whole(20, 150) / 10,
    LAFmin: LAeq - random.whole(20, 90) / 10,
    LCeq: LAeq + 8,
    levels: BANDS_HZ.map((_, band) => Math.round((LAeq - 8 - band / 2 + random.between(-3, 3)) * 10) / 10),
    flags: random.isBelow(0.05) ? [random.oneOf(['rain', 'wind', 'overload', 'calibration'])] : [],
    windSpeed: random.whole(0, 60) / 10,
    battery: 12.4,
  };
}

function corrupt(random: Random, record: InventedRecord): unknown {
  return random.oneOf<(whole: InventedRecord) => unknown>([
    (whole) => ({ ...whole, LAeq: 'loud' }),
    (whole) => ({ ...whole, LAeq: 400 }),
    (whole) => ({ ...whole, seconds: 0 }),
    (whole) => ({ ...whole, start: undefined }),
    (whole) => ({ ...whole, start: whole.start.replace(/^\d{4}/, '2098') }),
    (whole) => ({ ...whole, levels: whole.levels.slice(1) }),
    (whole) => ({ ...whole, flags: ['unheard-of'] }),
    (whole) => `${whole.start} ${whole.LAeq}`,
  ])(record);
}
