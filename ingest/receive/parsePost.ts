import { isAscii } from 'node:buffer';
import { setImmediate as othersHadATurn } from 'node:timers/promises';

/**
 * Of how many bytes text is made at once. Longer strings than 128 kB lie in memory of their own, which the system hands over anew for each:
 * making them costs seventy times as much a byte, more than reading the JSON.
 */
const PIECE_BYTES = 64 * 1024;
/** After so many pieces, about a millisecond's worth, others of this process have a turn. */
const PIECES_AT_A_TIME = 4;

const KNOWN_KEYS: ReadonlySet<string> = new Set(['bands', 'sentAt', 'intervals']);
const LIST_NAME = '"intervals"';
const BETWEEN_RECORDS = ['},{', '}, {'];
const BACKSLASH = 0x5c;

/** What the JSON of a post says, as `JSON.parse` would. @throws {SyntaxError} */
export async function parsePost(bytes: Buffer): Promise<unknown> {
  const read = new Text(bytes);
  if (bytes.length > PIECE_BYTES) {
    try {
      const parsed = await parseInPieces(bytes, read);
      if (parsed) return parsed;
    } catch (error) {
      // Whatever is wrong with it, the whole text tells.
      if (!(error instanceof SyntaxError)) throw error;
    }
  }
  return read.json('', 0, bytes.length, '');
}

/** Text of parts of some bytes: UTF-8, and of what is ASCII, nearly every post, the bytes are the characters. */
class Text {
  private readonly encoding: 'latin1' | 'utf8';

  constructor(private readonly bytes: Buffer) {
    this.encoding = isAscii(bytes) ? 'latin1' : 'utf8';
  }

  json(before: string, from: number, to: number, after: string): unknown {
    return JSON.parse(before + this.bytes.toString(this.encoding, from, to) + after);
  }
}

/**
 * Reads the list of records piece by piece; null where the post is not as monitors write it. A piece that is a JSON list by itself ends where a
 * record ends: anywhere else a bracket or a quotation mark would be left open.
 */
async function parseInPieces(bytes: Buffer, read: Text): Promise<object | null> {
  const first = listStart(bytes);
  const envelope = first === null ? null : knownOnly(read.json('', 0, first, ']}'));
  const between = BETWEEN_RECORDS.find((text) => first !== null && bytes.includes(text, first));
  // Known names only: the list that has just begun is the one of this name, and no later one takes its place.
  if (first === null || !envelope || !isEmptyList(envelope.intervals) || between === undefined) return null;
  const intervals: unknown[] = [];
  let from = first;
  for (let count = 1; bytes.length - from > PIECE_BYTES; count += 1) {
    const end = bytes.indexOf(between, from + PIECE_BYTES - 1024);
    if (end === -1) break;
    for (const record of read.json('[', from, end + 1, ']') as unknown[]) intervals.push(record);
    from = end + between.length - 1;
    if (count % PIECES_AT_A_TIME === 0) await othersHadATurn();
  }
  const tail = bytes.subarray(from);
  if (tail.includes(BACKSLASH) || tail.includes(LIST_NAME)) return null;
  const ending = knownOnly(read.json('{"intervals":[', from, bytes.length, ''));
  if (!ending || !Array.isArray(ending.intervals)) return null;
  for (const record of ending.intervals as unknown[]) intervals.push(record);
  return { ...envelope, ...ending, intervals };
}

interface Known {
  intervals?: unknown;
}

/** An object that has no names but the known ones. */
function knownOnly(value: unknown): Known | null {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return null;
  return Object.keys(value).every((key) => KNOWN_KEYS.has(key)) ? value : null;
}

const isEmptyList = (value: unknown) => Array.isArray(value) && value.length === 0;

/** Where the list of records begins, after its bracket; null where that is not to be seen. */
function listStart(bytes: Buffer): number | null {
  const at = bytes.indexOf(LIST_NAME);
  if (at === -1) return null;
  const opening = /^\s{0,8}:\s{0,8}\[/.exec(
    bytes.toString('latin1', at + LIST_NAME.length, at + LIST_NAME.length + 20),
  );
  return opening ? at + LIST_NAME.length + opening[0].length : null;
}
