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
  // A copy, because the driver's buffer may lie at an odd offset of its packet.
  new Uint8Array(levels.buffer).set(packed);
  return levels;
}
