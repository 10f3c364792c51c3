import { BAND_SLOTS } from '#lib/acoustics/bands';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { OCTAVE_SLOTS } from '#lib/acoustics/octaves';
import { type BandClassCounts, type PeriodSums } from '#lib/acoustics/periodSums';
import { ByteWriter } from '#lib/acoustics/varint';

/** Bytes of one band: slot (uint8), its valid seconds (uint32), its energy times seconds (float64), little endian. */
export const BAND_BYTES = 1 + 4 + 8;
/** In place of bands: octaves and thirds both occurred, so there are no band sums. */
const MIXED_MARK = 255;

/** Distributions of 31 thirds over half a day of minutes. */
const TYPICAL_CLASSES_BYTES = 32_768;

type BandSums = Pick<PeriodSums, 'isBandFractionMixed' | 'bandEnergySec' | 'bandValidSec'>;
/** Where the bands of a row go. */
export type BandRoom = Pick<PeriodSums, 'bandEnergySec' | 'bandValidSec'>;

/** Band energies for the column `band_energies`: the bands that have valid seconds, ascending. Equal sums give equal bytes. */
export function packBandEnergies(sums: BandSums): Buffer {
  if (sums.isBandFractionMixed) return Buffer.of(MIXED_MARK);
  const bytes = Buffer.alloc(BAND_SLOTS * BAND_BYTES);
  let at = 0;
  for (let slot = 0; slot < BAND_SLOTS; slot += 1) {
    const validSec = sums.bandValidSec[slot] ?? 0;
    if (validSec === 0) continue;
    bytes.writeUInt8(slot, at);
    bytes.writeUInt32LE(validSec, at + 1);
    bytes.writeDoubleLE(sums.bandEnergySec[slot] ?? 0, at + 5);
    at += BAND_BYTES;
  }
  return bytes.subarray(0, at);
}

/** Zeros for the bands of so many rows, in one piece: an array a row costs more than what is read into it. */
export function bandRooms(rows: number): (row: number) => BandRoom {
  const whole = new Float64Array(2 * rows * BAND_SLOTS);
  const part = (at: number) => whole.subarray(at * BAND_SLOTS, (at + 1) * BAND_SLOTS);
  return (row) => ({ bandEnergySec: part(2 * row), bandValidSec: part(2 * row + 1) });
}

/** Reads what `packBandEnergies` made, into `room` where that is given. @throws RangeError for other bytes. */
export function unpackBandEnergies(bytes: Buffer, room: BandRoom = bandRooms(1)(0)): BandSums {
  const { bandEnergySec, bandValidSec } = room;
  if (bytes.length === 1 && bytes[0] === MIXED_MARK) {
    return { isBandFractionMixed: true, bandEnergySec, bandValidSec };
  }
  if (bytes.length % BAND_BYTES !== 0) throw new RangeError('Band energies end within a band.');
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.length);
  for (let at = 0; at < bytes.length; at += BAND_BYTES) {
    const slot = view.getUint8(at);
    if (slot >= BAND_SLOTS) throw new RangeError(`${slot} is not a slot of a band.`);
    bandValidSec[slot] = view.getUint32(at + 1, true);
    bandEnergySec[slot] = view.getFloat64(at + 5, true);
  }
  return { isBandFractionMixed: false, bandEnergySec, bandValidSec };
}

/** Distributions of every band, then of every octave, each as its length (uint16, little endian) and its bytes. */
export function packBandClasses({ bands, octaves }: BandClassCounts): Buffer {
  const writer = new ByteWriter();
  writer.reserve(TYPICAL_CLASSES_BYTES);
  for (const counts of [...bands, ...octaves]) {
    writer.reserve(2);
    const lengthAt = writer.length;
    writer.length += 2;
    counts.encodeInto(writer);
    const length = writer.length - lengthAt - 2;
    writer.bytes[lengthAt] = length & 0xff;
    writer.bytes[lengthAt + 1] = length >>> 8;
  }
  return Buffer.from(writer.bytes.buffer, 0, writer.length);
}

/** What `packBandClasses` made; each distribution is read when it is looked at. @throws RangeError for other bytes. */
export function unpackBandClasses(bytes: Buffer): BandClassCounts {
  let at = 0;
  const next = (): LevelClassCounts => {
    const from = at + 2;
    at = from + bytes.readUInt16LE(at);
    return LevelClassCounts.encoded(bytes, from, at);
  };
  const bands = Array.from({ length: BAND_SLOTS }, next);
  const octaves = Array.from({ length: OCTAVE_SLOTS }, next);
  if (at !== bytes.length) throw new RangeError('Bytes follow the last distribution.');
  return { bands, octaves };
}
