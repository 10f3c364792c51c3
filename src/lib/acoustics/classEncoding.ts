import { LOWEST_TENTHS, type ClassSpan } from './classSpan';
import { MOST_VARINT_BYTES, readVarint, type ByteWriter, type VarintReader } from './varint';

/** No list of classes begins with this and goes on. */
const DENSE_MARK = 0;
/** A dense run is written as long as its numbers are not many more bytes than a list's; reading it is several times as fast. */
const DENSE_BYTES_A_CLASS = 3;

/** The most seconds of a class in a dense run, so that whole numbers of 32 bits do to read it. */
const MOST_DENSE_SEC = 0x7fff_ffff;
/** The most that a number of a dense run holds, by its width in bytes. */
const MOST_UNITS = { 1: 0xff, 2: 0xffff } as const;

/** What of a span is written. */
interface Occupied {
  /** Places of the first and the last class that occurs; −1 where none does. */
  first: number;
  last: number;
  classCount: number;
  mostSec: number;
  /** The greatest whole number of seconds that divides those of every class: the sample's length, mostly. 0 where there is more than a dense run may hold. */
  unitSec: number;
}

/**
 * Appends the classes that occur. A list: their number, then per class the step from the class before (the first from −30.0 dB)
 * and the seconds, all LEB128 varints. Where most classes of a range occur, a dense run instead: a zero byte; varints of the unit
 * in seconds, of the first class above −30.0 dB and of the number of classes; the width of a number, 1 or 2 bytes; then every class's
 * seconds in units, little endian. Equal counts give equal bytes.
 */
export function writeClasses(writer: ByteWriter, span: ClassSpan): void {
  const occupied = occupiedOf(span.secs);
  const width = widthOf(occupied);
  const length = occupied.last - occupied.first + 1;
  if (width !== null && length * width <= DENSE_BYTES_A_CLASS * occupied.classCount) {
    writeDense(writer, span, occupied, width);
  } else {
    writeList(writer, span, occupied.classCount);
  }
}

function occupiedOf(secs: Float64Array): Occupied {
  let first = -1;
  let last = -1;
  let classCount = 0;
  let mostSec = 0;
  for (let at = 0; at < secs.length; at += 1) {
    const sec = secs[at] ?? 0;
    if (sec === 0) continue;
    if (first < 0) first = at;
    last = at;
    classCount += 1;
    if (sec > mostSec) mostSec = sec;
  }
  return { first, last, classCount, mostSec, unitSec: isDenseSec(mostSec) ? unitOf(secs, mostSec) : 0 };
}

function isDenseSec(sec: number): boolean {
  return sec > 0 && sec <= MOST_DENSE_SEC;
}

/** The greatest common divisor of all, by Euclid's algorithm; in whole numbers of 32 bits, whose remainders are the quickest. */
function unitOf(secs: Float64Array, oneOfThemSec: number): number {
  let unitSec = oneOfThemSec | 0;
  for (let at = 0; at < secs.length; at += 1) {
    let rest = (secs[at] ?? 0) | 0;
    while (rest % unitSec !== 0) [rest, unitSec] = [unitSec, rest % unitSec];
  }
  return unitSec;
}

/** Bytes that hold the seconds of any class in units; null where there is no such run. */
function widthOf({ mostSec, unitSec }: Occupied): 1 | 2 | null {
  if (unitSec === 0) return null;
  if (holdsUnits(1, unitSec, mostSec)) return 1;
  return holdsUnits(2, unitSec, mostSec) ? 2 : null;
}

function holdsUnits(width: 1 | 2, unitSec: number, sec: number): boolean {
  return sec <= unitSec * MOST_UNITS[width] && unitSec * MOST_UNITS[width] <= MOST_DENSE_SEC;
}

function writeDense(
  writer: ByteWriter,
  { firstTenths, secs }: ClassSpan,
  { first, last, unitSec }: Occupied,
  width: 1 | 2,
): void {
  const length = last - first + 1;
  writer.reserve(2 + 3 * MOST_VARINT_BYTES + length * width);
  writer.varint(DENSE_MARK);
  writer.varint(unitSec);
  writer.varint(firstTenths + first - LOWEST_TENTHS);
  writer.varint(length);
  writer.varint(width);
  const { bytes } = writer;
  let to = writer.length;
  for (let at = first; at <= last; at += 1) {
    const units = (secs[at] ?? 0) / unitSec;
    bytes[to] = units & 0xff;
    if (width === 2) bytes[to + 1] = units >>> 8;
    to += width;
  }
  writer.length = to;
}

function writeList(writer: ByteWriter, { firstTenths, secs }: ClassSpan, classCount: number): void {
  writer.reserve(MOST_VARINT_BYTES * (1 + 2 * classCount));
  writer.varint(classCount);
  let previous = LOWEST_TENTHS;
  for (let at = 0; at < secs.length; at += 1) {
    const sec = secs[at] ?? 0;
    if (sec === 0) continue;
    writer.varint(firstTenths + at - previous);
    writer.varint(sec);
    previous = firstTenths + at;
  }
}

/**
 * Adds the classes in the bytes `from <= i < to`, which `writeClasses` made, to a span's.
 * @returns their seconds. @throws RangeError for other bytes.
 */
export function readClasses(span: ClassSpan, bytes: Uint8Array, from: number, to: number): number {
  const reader: VarintReader = { bytes, at: from };
  const isDense = to - from > 1 && bytes[from] === DENSE_MARK;
  const sec = isDense ? readDense(span, reader, to) : readList(span, reader);
  if (reader.at !== to) throw new RangeError('The last level class does not end where its bytes do.');
  return sec;
}

function readDense(span: ClassSpan, reader: VarintReader, to: number): number {
  reader.at += 1;
  const unitSec = readVarint(reader);
  const firstTenths = LOWEST_TENTHS + readVarint(reader);
  const length = readVarint(reader);
  const width = readVarint(reader);
  const { at } = reader;
  const isWidth = width === 1 || width === 2;
  if (
    !isWidth ||
    length === 0 ||
    !isDenseSec(unitSec) ||
    at + length * width !== to ||
    !holdsUnits(width, unitSec, unitSec)
  ) {
    throw new RangeError('A run of level classes is none that is written.');
  }
  span.cover(firstTenths, firstTenths + length - 1);
  const add = width === 1 ? addBytes : addPairs;
  const units = add(span.secs, firstTenths - span.firstTenths, reader, length, unitSec);
  reader.at = to;
  return units * unitSec;
}

function addBytes(
  secs: Float64Array,
  offset: number,
  { bytes, at }: VarintReader,
  length: number,
  unitSec: number,
): number {
  let sum = 0;
  for (let i = 0; i < length; i += 1) {
    const units = bytes[at + i] ?? 0;
    sum += units;
    secs[offset + i] = (secs[offset + i] ?? 0) + Math.imul(units, unitSec);
  }
  return sum;
}

function addPairs(
  secs: Float64Array,
  offset: number,
  { bytes, at }: VarintReader,
  length: number,
  unitSec: number,
): number {
  let sum = 0;
  for (let i = 0; i < length; i += 1) {
    const units = (bytes[at + 2 * i] ?? 0) + ((bytes[at + 2 * i + 1] ?? 0) << 8);
    sum += units;
    secs[offset + i] = (secs[offset + i] ?? 0) + Math.imul(units, unitSec);
  }
  return sum;
}

function readList(span: ClassSpan, reader: VarintReader): number {
  const classCount = readVarint(reader);
  let tenths = LOWEST_TENTHS;
  let sum = 0;
  for (let read = 0; read < classCount; read += 1) {
    const step = readVarint(reader);
    const sec = readVarint(reader);
    tenths += step;
    if (sec === 0 || (step === 0 && read > 0)) throw new RangeError('Level classes are out of order.');
    span.cover(tenths, tenths);
    const at = tenths - span.firstTenths;
    span.secs[at] = (span.secs[at] ?? 0) + sec;
    sum += sec;
  }
  return sum;
}
