import { crc32, deflateSync } from 'node:zlib';

const WIDTH = 640;
const HEIGHT = 480;
const HORIZON = 330;

type Rgb = readonly [red: number, green: number, blue: number];

/** A plain drawing, not a photograph, of a station: its mast or façade under the sky of the day, with the box of its electronics. */
export function drawStation(placement: 'free-field' | 'facade', mastHeightM: number, seed: number): Buffer {
  const picture = new Picture();
  const evening = (seed % 5) / 5;
  for (let y = 0; y < HORIZON; y += 1) {
    const light = y / HORIZON;
    picture.fill(0, y, WIDTH, 1, [
      120 + 90 * light + 40 * evening,
      150 + 70 * light,
      190 + 40 * light - 60 * evening,
    ]);
  }
  for (let x = 0; x < WIDTH; x += 1) {
    const rise = 18 * Math.sin((x + seed * 97) / 70) + 7 * Math.sin((x + seed * 31) / 23);
    picture.fill(x, HORIZON - 20 - rise, 1, 30 + rise, [92, 112, 104]);
  }
  picture.fill(0, HORIZON, WIDTH, HEIGHT - HORIZON, [104, 116, 78]);
  const mastX = 250 + ((seed * 37) % 140);
  const top = HORIZON + 60 - Math.min(300, 60 + mastHeightM * 32);
  if (placement === 'facade') drawHouse(picture, mastX + 18);
  const foot = placement === 'facade' ? top + 60 : HORIZON + 70;
  picture.fill(mastX - 3, top, 6, foot - top, [70, 74, 80]);
  if (placement === 'facade') picture.fill(mastX, foot - 6, 24, 5, [70, 74, 80]);
  picture.disc(mastX, top - 12, 13, [44, 46, 52]);
  picture.fill(mastX - 22, HORIZON + 18, 44, 52, [206, 208, 204]);
  picture.fill(mastX - 18, HORIZON + 22, 36, 44, [180, 184, 182]);
  return picture.png();
}

function drawHouse(picture: Picture, left: number): void {
  picture.fill(left, 90, WIDTH - left, HORIZON - 40, [176, 150, 128]);
  for (let row = 0; row < 3; row += 1) {
    for (let column = 0; column < 4; column += 1)
      picture.fill(left + 34 + column * 74, 126 + row * 74, 40, 46, [62, 76, 92]);
  }
}

class Picture {
  private readonly rows = Buffer.alloc(HEIGHT * (1 + WIDTH * 3));

  /** Paints a rectangle, as far as it lies in the picture. */
  fill(left: number, top: number, width: number, height: number, colour: Rgb): void {
    for (let y = Math.max(0, Math.round(top)); y < Math.min(HEIGHT, Math.round(top + height)); y += 1) {
      for (let x = Math.max(0, left); x < Math.min(WIDTH, left + width); x += 1) {
        for (const [at, value] of colour.entries())
          this.rows[y * (1 + WIDTH * 3) + 1 + x * 3 + at] = Math.min(255, Math.max(0, Math.round(value)));
      }
    }
  }

  disc(x: number, y: number, radius: number, colour: Rgb): void {
    for (let dy = -radius; dy <= radius; dy += 1) {
      const half = Math.round(Math.sqrt(radius * radius - dy * dy));
      this.fill(x - half, y + dy, 2 * half + 1, 1, colour);
    }
  }

  /** The picture as a PNG file: 8 bits of red, green and blue, rows unfiltered. */
  png(): Buffer {
    const header = Buffer.alloc(13);
    header.writeUInt32BE(WIDTH, 0);
    header.writeUInt32BE(HEIGHT, 4);
    header.set([8, 2, 0, 0, 0], 8);
    return Buffer.concat([
      Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
      chunk('IHDR', header),
      chunk('IDAT', deflateSync(this.rows, { level: 9 })),
      chunk('IEND', Buffer.alloc(0)),
    ]);
  }
}

function chunk(type: string, data: Buffer): Buffer {
  const typed = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const [length, sum] = [Buffer.alloc(4), Buffer.alloc(4)];
  length.writeUInt32BE(data.length);
  sum.writeUInt32BE(crc32(typed));
  return Buffer.concat([length, typed, sum]);
}
