import { listCounted, type CountedComplaint } from '#db/queries/complaintCounts';
import { median } from '#lib/acoustics/drift';
import { formatInstantUtc } from '#lib/contracts/common';
import type { ComplaintNumbers } from '#lib/contracts/complaintNumbers';
import { COMPLAINT_KINDS, COMPLAINT_SOURCES, type ComplaintKind } from '#lib/contracts/complaints';
import { localDateAt, localMinuteAt, type LocalDate } from '#lib/time/zone';

/** What complaints are counted of: those whose noise began in `fromSec <= t < toSec`, and of these what the rest narrows. */
export interface CountsQuery {
  networkId: number;
  timeZone: string;
  fromSec: number;
  toSec: number;
  kind?: ComplaintKind | null;
  area?: string | null;
}

const DAY_MS = 86_400_000;
const HOURS = 24;

/**
 * Numbers of a network's complaints in a period, without anything personal: for the page of numbers and for the monthly summary.
 * `nowSec` decides which due dates have passed.
 */
export async function complaintNumbers(query: CountsQuery, nowSec: number): Promise<ComplaintNumbers> {
  const rows = await countedOf(query);
  return {
    from: formatInstantUtc(query.fromSec),
    to: formatInstantUtc(query.toSec),
    timeZone: query.timeZone,
    ...numbersOf(rows, query, localDateAt(nowSec, query.timeZone)),
  };
}

/** The rows that a query counts. */
export async function countedOf(query: CountsQuery): Promise<CountedComplaint[]> {
  const rows = await listCounted(query.networkId, query);
  return rows.filter(
    ({ kind, area }) => (!query.kind || kind === query.kind) && (!query.area || area === query.area),
  );
}

/** Whether a complaint was closed as the same report as another one. */
export function isRepeat({ closingReason }: Pick<CountedComplaint, 'closingReason'>): boolean {
  return closingReason === 'repeated';
}

/** Counts rows in order of time; `today` is the network's civil date. */
export function numbersOf(
  rows: readonly CountedComplaint[],
  { timeZone, fromSec, toSec }: Pick<CountsQuery, 'timeZone' | 'fromSec' | 'toSec'>,
  today: LocalDate,
): Omit<ComplaintNumbers, 'from' | 'to' | 'timeZone'> {
  const counted = rows.filter((row) => !isRepeat(row));
  const monthOf = (sec: number) => localDateAt(sec, timeZone).slice(0, 7);
  const byMonth = tally(counted, ({ startsAtSec }) => monthOf(startsAtSec));
  const byHour = tally(counted, ({ startsAtSec }) => Math.floor(localMinuteAt(startsAtSec, timeZone) / 60));
  const byKind = tally(counted, ({ kind }) => kind);
  const bySource = tally(counted, ({ source }) => source);
  return {
    total: counted.length,
    repeats: rows.length - counted.length,
    byMonth: monthsBetween(monthOf(fromSec), monthOf(toSec - 1)).map((month) => ({
      month,
      count: byMonth.get(month) ?? 0,
    })),
    byKind: COMPLAINT_KINDS.map((kind) => ({ kind, count: byKind.get(kind) ?? 0 })),
    byArea: mostFirst(tally(counted, ({ area }) => area)).map(([area, count]) => ({ area, count })),
    byStation: mostFirst(tally(counted, ({ stationCode }) => stationCode)).map(([station, count]) => ({
      station,
      count,
    })),
    bySource: COMPLAINT_SOURCES.map((source) => ({ source, count: bySource.get(source) ?? 0 })),
    byHour: Array.from({ length: HOURS }, (_, hour) => byHour.get(hour) ?? 0),
    answers: answersOf(counted, timeZone, today),
    withExceedance: { count: counted.filter((row) => row.hasExceedance).length, of: counted.length },
  };
}

function answersOf(
  rows: readonly CountedComplaint[],
  timeZone: string,
  today: LocalDate,
): ComplaintNumbers['answers'] {
  const answered = rows.flatMap(({ createdAt, answeredAt, firstDueOn }) => {
    if (!answeredAt) return [];
    const answeredOn = localDateAt(Math.floor(answeredAt.getTime() / 1000), timeZone);
    return [
      { days: (answeredAt.getTime() - createdAt.getTime()) / DAY_MS, isInTime: answeredOn <= firstDueOn },
    ];
  });
  const overdue = rows.filter(
    ({ answeredAt, status, firstDueOn }) => !answeredAt && status === 'open' && firstDueOn < today,
  );
  return {
    answered: answered.length,
    medianDays: median(answered.map(({ days }) => days)),
    withinDue: {
      count: answered.filter(({ isInTime }) => isInTime).length,
      of: answered.length + overdue.length,
    },
  };
}

function tally<K>(rows: readonly CountedComplaint[], keyOf: (row: CountedComplaint) => K): Map<K, number> {
  const counts = new Map<K, number>();
  for (const row of rows) counts.set(keyOf(row), (counts.get(keyOf(row)) ?? 0) + 1);
  return counts;
}

/** Of the most first; those of no name last. */
function mostFirst(counts: ReadonlyMap<string | null, number>): [string | null, number][] {
  return [...counts].sort(
    ([a, m], [b, n]) => Number(a === null) - Number(b === null) || n - m || (a ?? '').localeCompare(b ?? ''),
  );
}

function monthsBetween(first: string, last: string): string[] {
  const months: string[] = [];
  for (let month = first; month <= last; month = nextMonth(month)) months.push(month);
  return months;
}

function nextMonth(month: string): string {
  const [year = 0, number = 0] = month.split('-').map(Number);
  return number === 12 ? `${year + 1}-01` : `${year}-${String(number + 1).padStart(2, '0')}`;
}
