import {
  closeSync,
  existsSync,
  fsyncSync,
  mkdirSync,
  openSync,
  readFileSync,
  renameSync,
  writeFileSync,
  writeSync,
} from 'node:fs';
import { join } from 'node:path';

/** A record with the instant that orders it. */
export interface SpooledRecord {
  startSec: number;
  record: unknown;
}

/**
 * What a monitor has measured and not yet seen acknowledged, on disk: a file of one JSON record a line. A record is
 * flushed before `append` returns, so a monitor that loses power loses no finished interval.
 */
export class Spool {
  private readonly path: string;
  private waiting: SpooledRecord[];

  constructor(directory: string) {
    mkdirSync(directory, { recursive: true });
    this.path = join(directory, 'waiting.ndjson');
    this.waiting = existsSync(this.path) ? parseLines(readFileSync(this.path, 'utf8')) : [];
  }

  get length(): number {
    return this.waiting.length;
  }

  get lastStartSec(): number | null {
    return this.waiting.at(-1)?.startSec ?? null;
  }

  append(records: SpooledRecord[]): void {
    if (records.length === 0) return;
    const file = openSync(this.path, 'a');
    writeSync(file, records.map((record) => `${JSON.stringify(record)}\n`).join(''));
    fsyncSync(file);
    closeSync(file);
    this.waiting.push(...records);
  }

  /** The oldest records that wait, at most `most`. */
  oldest(most: number): SpooledRecord[] {
    return this.waiting.slice(0, most);
  }

  /** Forgets the `count` oldest records: the server has answered for each of them. */
  settle(count: number): void {
    this.waiting = this.waiting.slice(count);
    const temporary = `${this.path}.new`;
    writeFileSync(temporary, this.waiting.map((record) => `${JSON.stringify(record)}\n`).join(''), {
      flush: true,
    });
    renameSync(temporary, this.path);
  }
}

/** A last line cut short by a loss of power is left out: its interval is measured again or shows as a gap. */
function parseLines(text: string): SpooledRecord[] {
  return text.split('\n').flatMap((line) => {
    try {
      return line === '' ? [] : [JSON.parse(line) as SpooledRecord];
    } catch {
      return [];
    }
  });
}
