import { formatInstantUtc } from '#lib/contracts/common';
import { CSV_LEADING, CSV_TRAILING } from '#lib/services/intervals/csv';
import { Random } from './random';

const BANDS = ['500', '1000', '2000'];

/** A file of minutes in the contract's own CSV, the same for the same seed; some rows come twice, differ or cannot be read. */
export async function* cardFile(seed: number, firstSec: number, rows: number): AsyncGenerator<Uint8Array> {
  const random = new Random(seed + 77);
  const encoder = new TextEncoder();
  yield encoder.encode(`${[...CSV_LEADING, ...BANDS, ...CSV_TRAILING].join(',')}\r\n`);
  for (let at = 0; at < rows; at += 1) {
    const row = lineOf(random, firstSec + at * 60);
    yield encoder.encode(row);
    if (random.isBelow(0.01)) yield encoder.encode(row);
    if (random.isBelow(0.01)) yield encoder.encode(lineOf(random, firstSec + at * 60));
    if (random.isBelow(0.01)) yield encoder.encode(row.replace(/,60,[^,]*/, ',60,loud'));
  }
}

function lineOf(random: Random, startSec: number): string {
  const cells: Record<string, string> = {
    start: formatInstantUtc(startSec),
    seconds: '60',
    LAeq: random.between(40, 70).toFixed(1),
  };
  for (const band of BANDS) cells[band] = random.between(30, 60).toFixed(1);
  return `${[...CSV_LEADING, ...BANDS, ...CSV_TRAILING].map((name) => cells[name] ?? '').join(',')}\r\n`;
}
