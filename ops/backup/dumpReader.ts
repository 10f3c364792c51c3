import { createHash, type Hash } from 'node:crypto';
import type { Readable } from 'node:stream';

/** What decides whether personal data can be read. Its rows rest apart from all others, and are kept for days only. */
export const APART: ReadonlySet<string> = new Set(['complaint_keys', 'complaint_contacts']);

/** How many rows a table has, and SHA-256 over its rows by their key, hexadecimal. */
export interface TableDigest {
  name: string;
  rows: number;
  sha256: string;
}

/**
 * Reads a dump line by line: parts the rows of `APART` from all else, counts and digests the rows of each table, and takes out whose the
 * triggers are, since the account may be another where they are restored. `definitions` are statements that make a table, by its name, in place
 * of those of the dump: a table that only leads to other servers is restored as one that has its rows.
 */
export class DumpReader {
  private table: string | null = null;
  private place: 'header' | 'table' | 'replaced' | 'rows' | 'body' | 'trailer' = 'header';
  private readonly tables = new Map<string, { rows: number; hash: Hash }>();
  private readonly apartLines: string[] = [];
  /** Where the binary log stood, where the server has one. */
  binaryLog: { file: string; position: number } | null = null;

  constructor(private readonly definitions: ReadonlyMap<string, string> = new Map()) {}

  /** Takes lines and answers what goes with the data; the rest waits in `apart`. */
  take(lines: string[]): string {
    const kept = lines.flatMap(
      (line) => this.replaced(line) ?? (this.takeLine(line) ? [withoutDefiner(line)] : []),
    );
    return kept.length === 0 ? '' : `${kept.join('\n')}\n`;
  }

  /** The rows that rest apart, as statements that a client can carry out by themselves. */
  get apart(): string {
    return `${this.apartLines.join('\n')}\n`;
  }

  /** Digests of all tables, those apart with them. Once only, when the dump has been read. */
  digests(): TableDigest[] {
    return [...this.tables].map(([name, { rows, hash }]) => ({ name, rows, sha256: hash.digest('hex') }));
  }

  /** What stands for a line of a definition that is replaced; null for any other. */
  private replaced(line: string): string[] | null {
    const isFirst = this.place === 'table' && line.startsWith('CREATE TABLE `');
    const definition = isFirst && this.table !== null ? this.definitions.get(this.table) : undefined;
    if (definition === undefined && this.place !== 'replaced') return null;
    this.place = line.endsWith(';') ? 'table' : 'replaced';
    return definition === undefined ? [] : [`${definition};`];
  }

  /** Whether the line goes with the data. */
  private takeLine(line: string): boolean {
    const before = this.place;
    this.place = this.placeOf(line);
    if (this.place === 'header' || this.place === 'trailer') {
      this.noteBinaryLog(line);
      this.apartLines.push(line);
      return true;
    }
    const isRow = before === 'rows' || this.place === 'rows';
    if (!isRow || this.table === null) return true;
    this.takeRow(this.table, line);
    if (line.endsWith(');')) this.place = 'table';
    if (!APART.has(this.table)) return true;
    this.apartLines.push(line);
    return false;
  }

  private placeOf(line: string): DumpReader['place'] {
    if (this.place === 'rows') return 'rows';
    if (this.place === 'body') return line === 'DELIMITER ;' ? 'table' : 'body';
    if (line.startsWith('DELIMITER ')) return 'body';
    if (line.startsWith('INSERT INTO `')) return 'rows';
    const begun = /^DROP TABLE IF EXISTS `([^`]+)`;$/.exec(line)?.[1];
    if (begun !== undefined) {
      this.table = begun;
      this.tables.set(begun, { rows: 0, hash: createHash('sha256') });
      return 'table';
    }
    return line.startsWith('/*!40103 SET TIME_ZONE=@OLD_TIME_ZONE') ? 'trailer' : this.place;
  }

  private takeRow(name: string, line: string): void {
    const table = this.tables.get(name);
    const from = line.startsWith('INSERT INTO `') ? line.indexOf(' VALUES ') + ' VALUES '.length : 0;
    if (!table) throw new Error(`The dump has rows of ${name} before the table.`);
    table.rows += 1;
    table.hash.update(line.slice(from, -1), 'latin1').update('\n');
  }

  private noteBinaryLog(line: string): void {
    const found = /MASTER_LOG_FILE='([^']+)', MASTER_LOG_POS=(\d+)/.exec(line);
    if (found?.[1] && found[2]) this.binaryLog = { file: found[1], position: Number(found[2]) };
  }
}

function withoutDefiner(line: string): string {
  return line.startsWith('/*!50003 CREATE*/') ? line.replace(/\/\*!50017 DEFINER=.*?\*\/ /, '') : line;
}

/** The lines of a stream, as many at once as came; a character is a byte. */
export async function* linesOf(stream: Readable): AsyncGenerator<string[]> {
  let rest = '';
  stream.setEncoding('latin1');
  for await (const chunk of stream as AsyncIterable<string>) {
    const lines = (rest + chunk).split('\n');
    rest = lines.pop() ?? '';
    yield lines;
  }
  if (rest !== '') yield [rest];
}
