import { crc32, deflateSync } from 'node:zlib';
import { type PackedSpectrogram } from '#lib/contracts/monthEvidence';
import { levelRampRgb, RAMP_STEPS } from '#lib/format/levelRamp';

/** Pixels of a band; columns are one pixel wide. */
const BAND_PIXELS = 8;
const SIGNATURE = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);

export interface SpectrogramPicture {
  png: Buffer;
  lowDb: number;
  highDb: number;
}

/** The month’s band levels as a PNG of palette colours: time to the right, frequency upward, white where there is no level. */
export function spectrogramPng({
  codes,
  columns,
  bandsHz,
  firstDb,
  stepDb,
}: PackedSpectrogram): SpectrogramPicture | null {
  const cells = Buffer.from(codes, 'base64');
  const known = cells.filter((code) => code > 0);
  if (known.length === 0) return null;
  const sorted = known.toSorted();
  // One cell in a thousand may lie beyond either end, so that one bang does not pale all else.
  const at = (share: number) => sorted[Math.round(share * (sorted.length - 1))] ?? 1;
  const dbOf = (code: number) => firstDb + (code - 1) * stepDb;
  const lowDb = Math.floor(dbOf(at(0.001)) / 5) * 5;
  const highDb = Math.max(lowDb + 5, Math.ceil(dbOf(at(0.999)) / 5) * 5);
  const bands = bandsHz.length;
  const rows = bands * BAND_PIXELS;
  const pixels = Buffer.alloc(rows * (columns + 1));
  for (let row = 0; row < rows; row += 1) {
    const band = bands - 1 - Math.floor(row / BAND_PIXELS);
    for (let column = 0; column < columns; column += 1) {
      const code = cells[column * bands + band] ?? 0;
      pixels[row * (columns + 1) + 1 + column] = code === 0 ? 0 : paletteIndex(dbOf(code), lowDb, highDb);
    }
  }
  const header = Buffer.alloc(13);
  header.writeUInt32BE(columns, 0);
  header.writeUInt32BE(rows, 4);
  header.set([8, 3, 0, 0, 0], 8);
  const png = Buffer.concat([
    SIGNATURE,
    chunk('IHDR', header),
    chunk('PLTE', palette()),
    chunk('IDAT', deflateSync(pixels)),
    chunk('IEND', Buffer.alloc(0)),
  ]);
  return { png, lowDb, highDb };
}

/** Index 0 is white; the ramp’s 255 louder steps follow. */
function palette(): Buffer {
  const ramp = levelRampRgb('light');
  const colours = Buffer.alloc(RAMP_STEPS * 3, 0xff);
  for (let step = 1; step < RAMP_STEPS; step += 1) {
    colours.set(ramp.subarray(step * 4, step * 4 + 3), step * 3);
  }
  return colours;
}

function paletteIndex(db: number, lowDb: number, highDb: number): number {
  const share = Math.min(1, Math.max(0, (db - lowDb) / (highDb - lowDb)));
  return 1 + Math.round(share * (RAMP_STEPS - 2));
}

function chunk(type: string, data: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const framed = Buffer.alloc(body.length + 8);
  framed.writeUInt32BE(data.length, 0);
  body.copy(framed, 4);
  framed.writeUInt32BE(crc32(body), body.length + 4);
  return framed;
}
