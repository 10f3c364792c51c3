const EXIF_NAME = 'Exif\0\0';
const ORIENTATION_TAG = 0x0112;
const UPRIGHT = 1;

/** Which way up a picture goes, 1 to 8, from the body of an Exif segment; 1 (upright) where it does not say. */
export function orientationOf(body: Uint8Array): number {
  const exif = Buffer.from(body.buffer, body.byteOffset, body.byteLength);
  if (exif.toString('latin1', 0, EXIF_NAME.length) !== EXIF_NAME) return UPRIGHT;
  const tiff = exif.subarray(EXIF_NAME.length);
  if (tiff.length < 8) return UPRIGHT;
  const isLittle = tiff.toString('latin1', 0, 2) === 'II';
  const uint16 = (at: number) => (isLittle ? tiff.readUInt16LE(at) : tiff.readUInt16BE(at));
  const directoryAt = isLittle ? tiff.readUInt32LE(4) : tiff.readUInt32BE(4);
  if (directoryAt + 2 > tiff.length) return UPRIGHT;
  const count = uint16(directoryAt);
  for (let entry = 0; entry < count; entry += 1) {
    const at = directoryAt + 2 + 12 * entry;
    if (at + 12 > tiff.length) return UPRIGHT;
    if (uint16(at) === ORIENTATION_TAG) return within(uint16(at + 8));
  }
  return UPRIGHT;
}

/** An Exif segment that says nothing but which way up the picture goes; none for an upright one. */
export function orientationSegment(orientation: number): Uint8Array[] {
  if (orientation === UPRIGHT) return [];
  const tiff = Buffer.alloc(26);
  tiff.write('MM\0*', 0, 'latin1');
  tiff.writeUInt32BE(8, 4);
  tiff.writeUInt16BE(1, 8);
  tiff.writeUInt16BE(ORIENTATION_TAG, 10);
  tiff.writeUInt16BE(3, 12);
  tiff.writeUInt32BE(1, 14);
  tiff.writeUInt16BE(orientation, 18);
  const head = Buffer.alloc(4);
  head.writeUInt16BE(0xffe1, 0);
  head.writeUInt16BE(2 + EXIF_NAME.length + tiff.length, 2);
  return [Buffer.concat([head, Buffer.from(EXIF_NAME, 'latin1'), tiff])];
}

const within = (orientation: number) => (orientation >= 1 && orientation <= 8 ? orientation : UPRIGHT);
