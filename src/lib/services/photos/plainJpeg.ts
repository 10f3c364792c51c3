import { orientationOf, orientationSegment } from './orientation';

const START_OF_IMAGE = 0xd8;
const END_OF_IMAGE = 0xd9;
const START_OF_SCAN = 0xda;
const EXIF = 0xe1;

/**
 * A JPEG file without what tells more than the picture: place, time, camera, comments, previews, and whatever follows its end.
 * Which way up it goes is kept. Null when it cannot be read.
 */
export function plainJpeg(bytes: Uint8Array): Uint8Array<ArrayBuffer> | null {
  if (bytes[0] !== 0xff || bytes[1] !== START_OF_IMAGE) return null;
  const kept: Uint8Array[] = [bytes.subarray(0, 2)];
  let hasScan = false;
  let at = 2;
  while (at + 4 <= bytes.length || isEnd(bytes, at)) {
    if (bytes[at] !== 0xff) return null;
    const marker = bytes[at + 1] ?? 0;
    if (marker === 0xff) {
      at += 1;
      continue;
    }
    if (marker === END_OF_IMAGE) return hasScan ? joined([...kept, bytes.subarray(at, at + 2)]) : null;
    const endAt = at + 2 + uint16(bytes, at + 2);
    if (endAt < at + 4 || endAt > bytes.length) return null;
    if (isPicture(marker, bytes, at)) kept.push(bytes.subarray(at, endAt));
    else if (marker === EXIF) kept.push(...orientationSegment(orientationOf(bytes.subarray(at + 4, endAt))));
    at = endAt;
    if (marker !== START_OF_SCAN) continue;
    hasScan = true;
    at = endOfScan(bytes, endAt);
    kept.push(bytes.subarray(endAt, at));
  }
  return null;
}

const isEnd = (bytes: Uint8Array, at: number) => bytes[at] === 0xff && bytes[at + 1] === END_OF_IMAGE;

/** Tables, frames and scans; of the application's segments those that say how colours are meant: JFIF, ICC, Adobe. */
function isPicture(marker: number, bytes: Uint8Array, at: number): boolean {
  if (marker < 0xe0) return true;
  if (marker > 0xef) return false;
  const names: Record<number, string> = { 0xe0: 'JFIF\0', 0xe2: 'ICC_PROFILE\0', 0xee: 'Adobe' };
  const name = names[marker];
  return (
    name !== undefined &&
    name === Buffer.from(bytes.subarray(at + 4, at + 4 + name.length)).toString('latin1')
  );
}

/** Where the next marker stands after a scan's data: stuffed zeros and restart markers belong to them. */
function endOfScan(bytes: Uint8Array, fromAt: number): number {
  for (let at = fromAt; at + 1 < bytes.length; at += 1) {
    if (bytes[at] !== 0xff) continue;
    const next = bytes[at + 1] ?? 0;
    if (next !== 0 && next !== 0xff && !(next >= 0xd0 && next <= 0xd7)) return at;
  }
  return bytes.length;
}

function uint16(bytes: Uint8Array, at: number): number {
  return ((bytes[at] ?? 0) << 8) | (bytes[at + 1] ?? 0);
}

function joined(parts: readonly Uint8Array[]): Uint8Array<ArrayBuffer> {
  return new Uint8Array(Buffer.concat(parts));
}
