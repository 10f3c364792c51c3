/** A JPEG's segment with its marker and length. */
export function segment(marker: number, body: Buffer): Buffer {
  const head = Buffer.from([0xff, marker, 0, 0]);
  head.writeUInt16BE(body.length + 2, 2);
  return Buffer.concat([head, body]);
}

/** A table as a decoder needs one; its values mean nothing. */
export const TABLE = segment(0xdb, Buffer.alloc(65, 7));

/** A scan whose data hold a stuffed zero and a restart marker. */
export const SCAN = Buffer.concat([
  segment(0xda, Buffer.from([1, 1, 0, 0, 63, 0])),
  Buffer.from([0x12, 0xff, 0x00, 0x34, 0xff, 0xd0, 0x56]),
]);

/** A JPEG of some segments and one scan: enough to be taken apart, not to be looked at. */
export function jpegOf(segments: readonly Uint8Array[]): Buffer {
  return Buffer.concat([Buffer.from([0xff, 0xd8]), ...segments, SCAN, Buffer.from([0xff, 0xd9])]);
}

export const PNG_SIGNATURE = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);

/** A PNG's chunk; its check sum is left at zero, which nobody reads here. */
export function chunk(type: string, body: Buffer): Buffer {
  const head = Buffer.alloc(8);
  head.writeUInt32BE(body.length, 0);
  head.write(type, 4, 'latin1');
  return Buffer.concat([head, body, Buffer.alloc(4)]);
}
