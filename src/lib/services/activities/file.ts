import { parse } from 'csv-parse/sync';
import {
  insertActivities,
  lockActivities,
  selectStandingActivities,
  type NewActivity,
} from '#db/queries/activities';
import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { MOST_ACTIVITY_LINES, newActivitySchema, type ActivityFileReport } from '#lib/contracts/activities';
import { formatInstantUtc } from '#lib/contracts/common';
import { parseUrlInstant } from '#lib/time/urlPeriod';
import { done, invalid, type Outcome } from '../outcome';
import { storedActivity } from './activityJson';

const NEEDED = ['kind', 'from', 'to'] as const;

interface Line {
  /** As counted in the file, its heading being 1. */
  line: number;
  cells: Record<string, string>;
}

interface Read {
  lines: { line: number; activity: NewActivity }[];
  refused: ActivityFileReport['refused'];
}

/**
 * Notes what a CSV file tells: columns kind, from, to, and perhaps place and note, in any order; times RFC 3339 or local to
 * `zone` ("2026-03-17T14:30"). A line noted before is known; a bad line never costs a good one.
 */
export async function noteFile(
  { networkId, userId, zone }: { networkId: number; userId: string; zone: string },
  text: string,
): Promise<Outcome<ActivityFileReport>> {
  const lines = linesOf(text);
  if (typeof lines === 'string') return invalid('file', lines);
  const read = readLines(lines, zone);
  return inTransaction<Outcome<ActivityFileReport>>(async (transaction) => {
    await lockActivities(networkId, transaction);
    const { fresh, known } = await sorted(networkId, read.lines, transaction);
    if (fresh.length > 0) await insertActivities(networkId, fresh, userId, transaction);
    const report = { added: fresh.length, known, refused: read.refused };
    const detail = { added: report.added, known, refused: read.refused.length };
    await appendAudit(
      { userId, networkId, action: 'activity.file', subject: 'operations log', detail },
      transaction,
    );
    return done(report);
  });
}

/** The lines of a file, or what is wrong with the file as a whole. */
function linesOf(text: string): Line[] | string {
  let rows: string[][];
  try {
    const delimiter = [',', ';', '\t'];
    rows = parse(text, {
      bom: true,
      trim: true,
      skip_empty_lines: true,
      relax_column_count: true,
      delimiter,
    });
  } catch {
    return 'could not be read as CSV: a quotation mark may be missing';
  }
  const heading = (rows[0] ?? []).map((cell) => cell.toLowerCase());
  const missing = NEEDED.filter((name) => !heading.includes(name));
  if (missing.length > 0)
    return `must have a first line with kind, from and to: ${missing.join(', ')} missing`;
  if (rows.length > MOST_ACTIVITY_LINES + 1) return `must have at most ${MOST_ACTIVITY_LINES} lines`;
  return rows.slice(1).map((row, at) => ({
    line: at + 2,
    cells: Object.fromEntries(heading.map((name, column) => [name, row[column] ?? ''])),
  }));
}

function readLines(lines: readonly Line[], zone: string): Read {
  const read: Read = { lines: [], refused: [] };
  for (const { line, cells } of lines) {
    const parsed = newActivitySchema.safeParse({
      kind: unescaped(cells['kind']),
      place: unescaped(cells['place']),
      from: instantText(cells['from'], zone),
      to: instantText(cells['to'], zone),
      note: unescaped(cells['note']),
    });
    if (parsed.success) read.lines.push({ line, activity: storedActivity(parsed.data) });
    else {
      const [issue] = parsed.error.issues;
      read.refused.push({
        line,
        message: `${String(issue?.path[0] ?? 'line')} ${issue?.message ?? 'is wrong'}`,
      });
    }
  }
  return read;
}

/** An apostrophe before what a spreadsheet would take for a formula is ours. */
function unescaped(text = ''): string {
  return /^'[=+\-@]/.test(text) ? text.slice(1) : text;
}

function instantText(text = '', zone: string): string {
  const sec = parseUrlInstant(text.replace(/^(\d{4}-\d{2}-\d{2}) (?=\d{2}:\d{2}$)/, '$1T'), zone);
  return sec === null ? text : formatInstantUtc(sec);
}

async function sorted(
  networkId: number,
  lines: Read['lines'],
  transaction: Connection,
): Promise<{ fresh: NewActivity[]; known: number }> {
  const fresh: NewActivity[] = [];
  if (lines.length === 0) return { fresh, known: 0 };
  const period = {
    fromSec: Math.min(...lines.map(({ activity }) => activity.fromSec)),
    toSec: Math.max(...lines.map(({ activity }) => activity.toSec)),
  };
  const stored = await selectStandingActivities(networkId, period, null, transaction);
  const seen = new Set(stored.map(sameness));
  for (const { activity } of lines) {
    const key = sameness(activity);
    if (!seen.has(key)) fresh.push(activity);
    seen.add(key);
  }
  return { fresh, known: lines.length - fresh.length };
}

function sameness({ kind, place, fromSec, toSec }: NewActivity): string {
  return JSON.stringify([kind.toLowerCase(), place.toLowerCase(), fromSec, toSec]);
}
