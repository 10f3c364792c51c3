import { readClasses, writeClasses } from './classEncoding';
import { ClassSpan, HIGHEST_TENTHS, LOWEST_TENTHS } from './classSpan';
import { centiDbToTenths } from './rounding';
import { ByteWriter } from './varint';

export { MAX_LEVEL_CENTI_DB, MIN_LEVEL_CENTI_DB } from './levelRange';

/** Samples that an exceedance level needs, times min(N, 100 − N): 30 for L10, 300 for L1. Our own rule. */
const SAMPLES_TIMES_PERCENT = 300;

/**
 * Seconds spent in each 0.1 dB class of level: the exact distribution of samples that were rounded half up to tenths, which
 * merges across periods without loss. Holds only the span of classes that occur.
 */
export class LevelClassCounts {
  readonly #span = new ClassSpan();
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
    const span = this.#span;
    span.cover(tenths, tenths);
    const at = tenths - span.firstTenths;
    span.secs[at] = (span.secs[at] ?? 0) + sec;
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
    this.#read();
    this.#span.cover(lowest, highest);
    const { secs: own, firstTenths: first } = this.#span;
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
    const from = other.#span;
    const into = this.#span;
    into.cover(from.firstTenths, from.firstTenths + from.secs.length - 1);
    const shift = from.firstTenths - into.firstTenths;
    for (let i = 0; i < from.secs.length; i += 1) {
      into.secs[i + shift] = (into.secs[i + shift] ?? 0) + (from.secs[i] ?? 0);
    }
    this.#totalSec += other.#totalSec;
  }

  /** The classes that occur with their seconds, as [tenths of a dB, seconds], ascending. */
  *entries(): Generator<[tenths: number, sec: number]> {
    this.#read();
    const { secs, firstTenths } = this.#span;
    for (let i = 0; i < secs.length; i += 1) {
      const sec = secs[i] ?? 0;
      if (sec > 0) yield [firstTenths + i, sec];
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
    const { secs, firstTenths } = this.#span;
    for (let i = secs.length - 1; i >= 0; i -= 1) {
      const sec = secs[i] ?? 0;
      if (sec === 0) continue;
      if (aboveSec * 100 > allowed) break;
      smallest = firstTenths + i;
      aboveSec += sec;
    }
    return smallest;
  }

  /** Compact bytes for storage, as `writeClasses` defines them. Equal counts give equal bytes. */
  encode(): Uint8Array {
    const writer = new ByteWriter();
    this.encodeInto(writer);
    return writer.bytes.slice(0, writer.length);
  }

  /** Appends what `encode` gives. */
  encodeInto(writer: ByteWriter): void {
    this.#read();
    writeClasses(writer, this.#span);
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
    this.#totalSec += readClasses(this.#span, bytes, from, to);
  }
}
