import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';

/** Band levels (hundredths of a dB, −32768 = none) as stored: int16, little endian, one a band of the set. */
export function packLevels(levelsCentiDb: Int16Array): Buffer {
  const packed = Buffer.allocUnsafe(levelsCentiDb.length * 2);
  for (let at = 0; at < levelsCentiDb.length; at += 1) {
    packed.writeInt16LE(levelsCentiDb[at] ?? NO_LEVEL_CENTI_DB, at * 2);
  }
  return packed;
}

/** The band levels of stored bytes. */
export function unpackLevels(packed: Buffer): Int16Array {
  const levels = new Int16Array(packed.length / 2);
  // Number by number: asking a small array for its buffer moves it off the heap, which costs ten times as much.
  for (let at = 0; at < levels.length; at += 1) {
    levels[at] = (packed[2 * at] ?? 0) | ((packed[2 * at + 1] ?? 0) << 8);
  }
  return levels;
}
