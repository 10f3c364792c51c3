import { ByteWriter, MOST_VARINT_BYTES, readVarint, type VarintReader } from './varint';
import { MAX_SUM_CENTI_DB, MIN_LEVEL_CENTI_DB } from './levelRange';
import { centiDbToTenths } from './rounding';

export { MAX_LEVEL_CENTI_DB, MIN_LEVEL_CENTI_DB } from './levelRange';

const LOWEST_TENTHS = MIN_LEVEL_CENTI_DB / 10;
const HIGHEST_TENTHS = MAX_SUM_CENTI_DB / 10;
const GROWTH_CLASSES = 32;
/** Shared by all that count nothing yet: making an array costs more than what most rows do with it. */
const NO_CLASSES = new Float64Array(0);

/** Samples that an exceedance level needs, times min(N, 100 − N): 30 for L10, 300 for L1. Our own rule. */
const SAMPLES_TIMES_PERCENT = 300;

/**
 * Seconds spent in each 0.1 dB class of level: the exact distribution of samples that were rounded half up to tenths, which
 * merges across periods without loss. Holds only the span of classes that occur.
 */
export class LevelClassCounts {
  #firstTenths = 0;
  #secs = NO_CLASSES;
  #totalSec = 0;
  /** Where the encoded bytes lie that stand for everything until somebody looks. */
  #unread: Uint8Array | null = null;
  #unreadFrom = 0;
  #unreadTo = 0;

  /** Seconds counted. */
  get totalSec(): number {
    this.#read();
    return this.#totalSec;
  }

  /** Counts `sec` whole seconds at a level in hundredths of a dB, rounded half up to its class. */
  add(centiDb: number, sec: number): void {
    this.addTenths(centiDbToTenths(centiDb), sec);
  }

  /**
   * Counts `sec` whole seconds in the class of `tenths`.
   * @throws RangeError for seconds that are no whole number, or a level outside the stored range.
   */
  addTenths(tenths: number, sec: number): void {
    if (!Number.isInteger(sec) || sec < 0) throw new RangeError(`${sec} is not a whole number of seconds.`);
    if (!Number.isInteger(tenths) || tenths < LOWEST_TENTHS || tenths > HIGHEST_TENTHS) {
      throw new RangeError(`${tenths} tenths of a dB is outside the stored range of levels.`);
    }
    if (sec === 0) return;
    this.#read();
    if (tenths < this.#firstTenths || tenths >= this.#firstTenths + this.#secs.length) this.#cover(tenths);
    const at = tenths - this.#firstTenths;
    this.#secs[at] = (this.#secs[at] ?? 0) + sec;
    this.#totalSec += sec;
  }

  /**
   * Counts many levels in tenths of a dB with their whole seconds, the first `count` of both arrays.
   * @throws RangeError as `addTenths` does; then nothing is counted.
   */
  addEach(tenths: Int16Array, secs: Float64Array, count: number): void {
    let lowest = HIGHEST_TENTHS + 1;
    let highest = LOWEST_TENTHS - 1;
    for (let i = 0; i < count; i += 1) {
      const sec = secs[i] ?? NaN;
      const level = tenths[i] ?? NaN;
      if (!Number.isInteger(sec) || sec < 0) throw new RangeError(`${sec} is not a whole number of seconds.`);
      if (level < lowest) lowest = level;
      if (level > highest) highest = level;
    }
    if (highest < lowest) return;
    if (lowest < LOWEST_TENTHS || highest > HIGHEST_TENTHS) {
      throw new RangeError(`${lowest} to ${highest} tenths of a dB leave the stored range of levels.`);
    }
    this.#read();
    this.#cover(lowest);
    this.#cover(highest);
    const own = this.#secs;
    const first = this.#firstTenths;
    for (let i = 0; i < count; i += 1) {
      const at = (tenths[i] ?? NaN) - first;
      const sec = secs[i] ?? NaN;
      own[at] = (own[at] ?? 0) + sec;
      this.#totalSec += sec;
    }
  }

  /** Adds another distribution's seconds to this one. */
  merge(other: LevelClassCounts): void {
    this.#read();
    if (other.#unread) {
      this.#addEncoded(other.#unread, other.#unreadFrom, other.#unreadTo);
      return;
    }
    if (other.#totalSec === 0) return;
    this.#cover(other.#firstTenths);
    this.#cover(other.#firstTenths + other.#secs.length - 1);
    const shift = other.#firstTenths - this.#firstTenths;
    for (let i = 0; i < other.#secs.length; i += 1) {
      this.#secs[i + shift] = (this.#secs[i + shift] ?? 0) + (other.#secs[i] ?? 0);
    }
    this.#totalSec += other.#totalSec;
  }

  /** The classes that occur with their seconds, as [tenths of a dB, seconds], ascending. */
  *entries(): Generator<[tenths: number, sec: number]> {
    this.#read();
    for (let i = 0; i < this.#secs.length; i += 1) {
      const sec = this.#secs[i] ?? 0;
      if (sec > 0) yield [this.#firstTenths + i, sec];
    }
  }

  /**
   * The N % exceedance level in dB: the smallest level that is exceeded for no more than `percent` % of the time counted
   * (the inverted distribution, no interpolation). `sampleSec` is the length of the base samples; null where lengths are
   * mixed, and then, or with fewer than 300/min(N, 100−N) samples, there is no such level: null.
   * @throws RangeError unless 0 < percent < 100.
   */
  exceedanceLevelDb(percent: number, sampleSec: number | null): number | null {
    const tenths = this.exceededTenths(percent);
    if (sampleSec === null || tenths === null) return null;
    const enough = this.#totalSec * Math.min(percent, 100 - percent) >= SAMPLES_TIMES_PERCENT * sampleSec;
    return enough ? tenths / 10 : null;
  }

  /** The exceedance level in tenths of a dB by its bare definition, however few the samples; null when nothing is counted. */
  exceededTenths(percent: number): number | null {
    if (!(percent > 0 && percent < 100)) throw new RangeError(`${percent} % is not between 0 and 100.`);
    this.#read();
    const allowed = percent * this.#totalSec;
    let aboveSec = 0;
    let smallest: number | null = null;
    for (let i = this.#secs.length - 1; i >= 0; i -= 1) {
      const sec = this.#secs[i] ?? 0;
      if (sec === 0) continue;
      if (aboveSec * 100 > allowed) break;
      smallest = this.#firstTenths + i;
      aboveSec += sec;
    }
    return smallest;
  }

  /**
   * Compact bytes for storage: number of classes, then per class the step from the class before (the first from −30.0 dB)
   * and the seconds, all LEB128 varints. Equal counts give equal bytes.
   */
  encode(): Uint8Array {
    const writer = new ByteWriter();
    this.encodeInto(writer);
    return writer.bytes.slice(0, writer.length);
  }

  /** Appends what `encode` gives. */
  encodeInto(writer: ByteWriter): void {
    this.#read();
    let classCount = 0;
    for (let i = 0; i < this.#secs.length; i += 1) if ((this.#secs[i] ?? 0) > 0) classCount += 1;
    writer.reserve(MOST_VARINT_BYTES * (1 + 2 * classCount));
    writer.varint(classCount);
    let previous = LOWEST_TENTHS;
    // Not through `entries`: a month's rows hold half a million classes, and a generator takes most of the time.
    for (let i = 0; i < this.#secs.length; i += 1) {
      const sec = this.#secs[i] ?? 0;
      if (sec === 0) continue;
      writer.varint(this.#firstTenths + i - previous);
      writer.varint(sec);
      previous = this.#firstTenths + i;
    }
  }

  /** @throws RangeError for bytes that `encode` did not make. */
  static decode(bytes: Uint8Array): LevelClassCounts {
    const counts = LevelClassCounts.encoded(bytes);
    counts.#read();
    return counts;
  }

  /**
   * The distribution that `encode` made the bytes `from <= i < to` of. They are read when it is first looked at: what is only
   * merged goes straight from bytes into sums, a year of bands several times as fast. Other bytes are refused then.
   */
  static encoded(bytes: Uint8Array, from = 0, to = bytes.length): LevelClassCounts {
    const counts = new LevelClassCounts();
    counts.#unread = bytes;
    counts.#unreadFrom = from;
    counts.#unreadTo = to;
    return counts;
  }

  #read(): void {
    const unread = this.#unread;
    if (!unread) return;
    this.#unread = null;
    this.#addEncoded(unread, this.#unreadFrom, this.#unreadTo);
  }

  #addEncoded(bytes: Uint8Array, from: number, to: number): void {
    const reader: VarintReader = { bytes, at: from };
    const classCount = readVarint(reader);
    let tenths = LOWEST_TENTHS;
    let secs = this.#secs;
    let first = this.#firstTenths;
    for (let read = 0; read < classCount; read += 1) {
      const step = readVarint(reader);
      const sec = readVarint(reader);
      tenths += step;
      if (sec === 0 || (step === 0 && read > 0)) throw new RangeError('Level classes are out of order.');
      if (tenths > HIGHEST_TENTHS)
        throw new RangeError(`${tenths} tenths of a dB is outside the stored range of levels.`);
      if (tenths < first || tenths >= first + secs.length) {
        this.#cover(tenths);
        secs = this.#secs;
        first = this.#firstTenths;
      }
      secs[tenths - first] = (secs[tenths - first] ?? 0) + sec;
      this.#totalSec += sec;
    }
    if (reader.at !== to) throw new RangeError('The last level class does not end where its bytes do.');
  }

  /** Makes the span of classes reach `tenths`, with some to spare on the side where it grows. */
  #cover(tenths: number): void {
    const first = this.#firstTenths;
    const end = first + this.#secs.length;
    if (first <= tenths && tenths < end) return;
    const isEmpty = this.#secs.length === 0;
    // Three times as long at least, because every new array costs more than a day's samples in it.
    const growth = Math.max(GROWTH_CLASSES, 2 * this.#secs.length);
    const from = isEmpty || tenths < first ? Math.max(LOWEST_TENTHS, tenths - growth) : first;
    const to = isEmpty || tenths >= end ? Math.min(HIGHEST_TENTHS, tenths + growth) + 1 : end;
    const grown = new Float64Array(to - from);
    grown.set(this.#secs, isEmpty ? 0 : first - from);
    this.#secs = grown;
    this.#firstTenths = from;
  }
}
