import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';

/** Band levels (hundredths of a dB, −32768 = none) as stored: int16, little endian, one a band of the set. */
export function packLevels(levelsCentiDb: Int16Array): Buffer {
  const packed = Buffer.allocUnsafe(levelsCentiDb.length * 2);
  for (let at = 0; at < levelsCentiDb.length; at += 1) {
    packed.writeInt16LE(levelsCentiDb[at] ?? NO_LEVEL_CENTI_DB, at * 2);
  }
  return packed;
}

/** As `packLevels`, in hexadecimal digits. */
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

/** The band levels of stored bytes. */
export function unpackLevels(packed: Buffer): Int16Array {
  const levels = new Int16Array(packed.length / 2);
  // Number by number: asking a small array for its buffer moves it off the heap, which costs ten times as much.
  for (let at = 0; at < levels.length; at += 1) {
    levels[at] = (packed[2 * at] ?? 0) | ((packed[2 * at + 1] ?? 0) << 8);
  }
  return levels;
}
