const SIGNATURE = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

/** Chunks that make the picture and its colours; text, times, Exif and everything unknown are left out. */
const PICTURE_CHUNKS = new Set([
  'IHDR',
  'PLTE',
  'tRNS',
  'IDAT',
  'IEND',
  'gAMA',
  'cHRM',
  'sRGB',
  'iCCP',
  'sBIT',
  'bKGD',
  'pHYs',
]);

/** A PNG file without what tells more than the picture, and without whatever follows its end. Null when it cannot be read. */
export function plainPng(bytes: Uint8Array): Uint8Array<ArrayBuffer> | null {
  if (!SIGNATURE.every((byte, at) => bytes[at] === byte)) return null;
  const file = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const kept: Uint8Array[] = [file.subarray(0, SIGNATURE.length)];
  let at = SIGNATURE.length;
  while (at + 12 <= file.length) {
    const endAt = at + 12 + file.readUInt32BE(at);
    const type = file.toString('latin1', at + 4, at + 8);
    if (endAt > file.length || (at === SIGNATURE.length) !== (type === 'IHDR')) return null;
    if (PICTURE_CHUNKS.has(type)) kept.push(file.subarray(at, endAt));
    if (type === 'IEND') return new Uint8Array(Buffer.concat(kept));
    at = endAt;
  }
  return null;
}
