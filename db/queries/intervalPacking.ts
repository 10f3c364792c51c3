import { endianness } from 'node:os';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';

const IS_LITTLE_ENDIAN = endianness() === 'LE';

/** Band levels (hundredths of a dB, −32768 = none) as stored, in hexadecimal digits: int16, little endian, one a band of the set. */
export function packLevelsHex(levelsCentiDb: Int16Array): string {
  const count = levelsCentiDb.length;
  const packed = count * 2 <= scratch.length ? scratch : Buffer.allocUnsafe(count * 2);
  for (let at = 0; at < count; at += 1) {
    const level = levelsCentiDb[at] ?? NO_LEVEL_CENTI_DB;
    packed[2 * at] = level & 0xff;
    packed[2 * at + 1] = (level >> 8) & 0xff;
  }
  return packed.toString('hex', 0, count * 2);
}

/** Room for the levels of one interval, used over and over. */
const scratch = Buffer.alloc(128);

/**
 * The band levels of many intervals, beside their stored bytes. They share one buffer: an array of its own for each takes longer to make
 * and to collect than its numbers take to read.
 */
export function unpackAll(packed: readonly Buffer[]): Int16Array[] {
  const all = new Int16Array(packed.reduce((bytes, { length }) => bytes + length, 0) / 2);
  const bytes = new Uint8Array(all.buffer);
  let at = 0;
  const unpacked = packed.map((levels) => {
    bytes.set(levels, at);
    const from = at / 2;
    at += levels.length;
    return all.subarray(from, at / 2);
  });
  if (!IS_LITTLE_ENDIAN) Buffer.from(all.buffer).swap16();
  return unpacked;
}
