/**
 * A station's levels over time in equal steps, as sent in `application/octet-stream`. Levels are hundredths of a dB, −32768 = none.
 * A column shows what was measured, whether it counts in figures or not; its seconds and reasons say which.
 */
export interface SpectrogramColumns {
  header: SpectrogramHeader;
  /** Start of each column, epoch seconds. */
  startSec: Uint32Array;
  /** Seconds that intervals cover, valid or not. */
  presentSec: Uint32Array;
  /** Seconds that count in statistics. */
  validSec: Uint32Array;
  /** Seconds whose intervals arrived more than an hour after they ended. */
  lateSec: Uint32Array;
  /** Why seconds do not count: bit n is `reasons[n]` of the header. */
  reasonBits: Uint16Array;
  /** Flags seen: bit n is `flags[n]` of the header; bit 15: LAeq was computed from the bands. */
  flagBits: Uint16Array;
  laeqCentiDb: Int16Array;
  lafmaxCentiDb: Int16Array;
  lafminCentiDb: Int16Array;
  /** Unweighted band levels, column after column, each in the order of the header's bands. */
  levelsCentiDb: Int16Array;
  /** Null where they were not asked for. */
  percentiles: PercentileColumns | null;
}

/**
 * Levels exceeded 10, 50 and 90 % of the time, of what counts. Each column has those of the block of UTC that it begins in: a
 * column by itself often has too few samples for them.
 */
export interface PercentileColumns {
  /** Length of the blocks, from 00:00 UTC on. */
  blockSec: number;
  la10CentiDb: Int16Array;
  la50CentiDb: Int16Array;
  la90CentiDb: Int16Array;
}

/** What the arrays are of. */
export interface SpectrogramHeader {
  /** Start of the first column, epoch seconds; at or shortly before what was asked for. */
  from: number;
  /** Length of every column. */
  stepSeconds: number;
  columns: number;
  bandFraction: 1 | 3;
  /** Nominal Hz, ascending. */
  bands: number[];
  timeZone: string;
  /** `quarter-hours`: levels of what counts only; `intervals`: of everything measured. */
  source: 'intervals' | 'quarter-hours';
  /** Meaning of the reason bits, from bit 0 on. */
  reasons: string[];
  /** Meaning of the flag bits, from bit 0 on. */
  flags: string[];
  /** Length of the blocks that LA10, LA50 and LA90 are of; without it there are none. */
  percentileSeconds?: number;
}

const MAGIC = 0x31_53_54_42; // "BTS1" read as a little-endian uint32
const PREFIX_BYTES = 8;

/** The layout for the OpenAPI document. */
export const SPECTROGRAM_LAYOUT =
  'Little endian. uint32 0x31535442 ("BTS1"); uint32 h, the length of the header; h bytes of JSON (UTF-8, padded with spaces to ' +
  'a multiple of 4), the header with `columns` n and `bands` b; then arrays without gaps: uint32[n] start (epoch seconds), ' +
  'uint32[n] present seconds, uint32[n] valid seconds, uint32[n] late seconds, uint16[n] reason bits, uint16[n] flag bits, ' +
  'int16[n] LAeq, int16[n] LAFmax, int16[n] LAFmin, int16[n·b] band levels, column after column; where the ' +
  'header has `percentileSeconds` then int16[n] LA10, int16[n] LA50, int16[n] LA90. Levels in hundredths of a dB, −32768 = none.';

/** Bytes of a spectrogram. */
export function encodeSpectrogram(columns: SpectrogramColumns): Uint8Array<ArrayBuffer> {
  const json = new TextEncoder().encode(JSON.stringify(columns.header));
  const headerBytes = Math.ceil(json.length / 4) * 4;
  const arrays = arraysOf(columns);
  const length = arrays.reduce((sum, array) => sum + array.byteLength, PREFIX_BYTES + headerBytes);
  const bytes = new Uint8Array(length).fill(0x20, PREFIX_BYTES, PREFIX_BYTES + headerBytes);
  const view = new DataView(bytes.buffer);
  view.setUint32(0, MAGIC, true);
  view.setUint32(4, headerBytes, true);
  bytes.set(json, PREFIX_BYTES);
  let at = PREFIX_BYTES + headerBytes;
  for (const array of arrays) {
    bytes.set(new Uint8Array(array.buffer, array.byteOffset, array.byteLength), at);
    at += array.byteLength;
  }
  return bytes;
}

/** Reads the bytes of a spectrogram; the arrays are views of them. @throws RangeError for other bytes. */
export function decodeSpectrogram(bytes: ArrayBuffer): SpectrogramColumns {
  const view = new DataView(bytes);
  if (bytes.byteLength < PREFIX_BYTES || view.getUint32(0, true) !== MAGIC) {
    throw new RangeError('These bytes are no spectrogram.');
  }
  const headerBytes = view.getUint32(4, true);
  const json = new TextDecoder().decode(new Uint8Array(bytes, PREFIX_BYTES, headerBytes));
  const header = JSON.parse(json) as SpectrogramHeader;
  const { columns: count, bands } = header;
  let at = PREFIX_BYTES + headerBytes;
  const next = <T>(
    make: new (buffer: ArrayBuffer, offset: number, length: number) => T,
    bytesEach: number,
    length: number,
  ) => {
    const array = new make(bytes, at, length);
    at += bytesEach * length;
    return array;
  };
  const columns = {
    header,
    startSec: next(Uint32Array, 4, count),
    presentSec: next(Uint32Array, 4, count),
    validSec: next(Uint32Array, 4, count),
    lateSec: next(Uint32Array, 4, count),
    reasonBits: next(Uint16Array, 2, count),
    flagBits: next(Uint16Array, 2, count),
    laeqCentiDb: next(Int16Array, 2, count),
    lafmaxCentiDb: next(Int16Array, 2, count),
    lafminCentiDb: next(Int16Array, 2, count),
    levelsCentiDb: next(Int16Array, 2, count * bands.length),
  };
  const blockSec = header.percentileSeconds;
  if (blockSec === undefined) return { ...columns, percentiles: null };
  const level = () => next(Int16Array, 2, count);
  return {
    ...columns,
    percentiles: { blockSec, la10CentiDb: level(), la50CentiDb: level(), la90CentiDb: level() },
  };
}

/** The arrays in the order of the layout. Typed arrays are little endian on every platform that runs a browser or Node 20. */
function arraysOf(columns: SpectrogramColumns) {
  const { percentiles } = columns;
  return [
    columns.startSec,
    columns.presentSec,
    columns.validSec,
    columns.lateSec,
    columns.reasonBits,
    columns.flagBits,
    columns.laeqCentiDb,
    columns.lafmaxCentiDb,
    columns.lafminCentiDb,
    columns.levelsCentiDb,
    ...(percentiles ? [percentiles.la10CentiDb, percentiles.la50CentiDb, percentiles.la90CentiDb] : []),
  ];
}
