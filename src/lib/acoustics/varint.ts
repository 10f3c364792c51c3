/** A place in bytes that varints are read from. */
export interface VarintReader {
  bytes: Uint8Array;
  at: number;
}

/** Bytes one after another in a buffer that grows; used again once its bytes are taken. */
export class ByteWriter {
  bytes = new Uint8Array(1024);
  /** Bytes written. */
  length = 0;

  /** Makes room for so many more bytes. */
  reserve(more: number): void {
    if (this.length + more <= this.bytes.length) return;
    const grown = new Uint8Array(Math.max(this.length + more, 2 * this.bytes.length));
    grown.set(this.bytes.subarray(0, this.length));
    this.bytes = grown;
  }

  /** Appends a whole number from 0 to 2^53 − 1 as an unsigned LEB128 varint, seven bits a byte, low ones first, for which room is reserved. */
  varint(value: number): void {
    let rest = value;
    while (rest >= 0x80) {
      this.bytes[this.length] = (rest % 0x80) + 0x80;
      this.length += 1;
      rest = Math.floor(rest / 0x80);
    }
    this.bytes[this.length] = rest;
    this.length += 1;
  }
}

/** The most bytes that a varint takes. */
export const MOST_VARINT_BYTES = 8;

/** Reads the varint at `reader.at` and steps past it. @throws RangeError when the bytes end within it or it is too long. */
export function readVarint(reader: VarintReader): number {
  const only = reader.bytes[reader.at];
  // Nearly all take one byte.
  if (only !== undefined && only < 0x80) {
    reader.at += 1;
    return only;
  }
  let value = 0;
  for (let scale = 1; scale <= Number.MAX_SAFE_INTEGER; scale *= 0x80) {
    const byte = reader.bytes[reader.at];
    if (byte === undefined) throw new RangeError('The bytes end within a number.');
    reader.at += 1;
    value += (byte & 0x7f) * scale;
    if (byte < 0x80) return value;
  }
  throw new RangeError('A number is longer than any that is written.');
}
