import { localDate } from '#lib/contracts/common';
import { MEASURE_DAYS } from '#lib/contracts/complaintNumbers';
import { COMPLAINT_KINDS, type ComplaintKind } from '#lib/contracts/complaints';
import { addDays, localDateAt, startOfDaySec, type LocalDate } from '#lib/time/zone';

/** Which numbers an address asks for. */
export interface NumbersView {
  from: LocalDate;
  /** Exclusive. */
  to: LocalDate;
  kind: ComplaintKind | null;
  area: string | null;
  measure: LocalDate | null;
  days: number;
}

const MOST_DAYS = 3660;
const MONTHS_SHOWN = 12;
const EARLIEST = '1970-01-02';
const LATEST = '2105-12-31';

/** Reads an address; what it says wrongly counts as left out: the last twelve months up to the end of this one. */
export function readNumbersView({ searchParams }: URL, zone: string, nowSec: number): NumbersView {
  const date = (name: string) => {
    const parsed = localDate.safeParse(searchParams.get(name));
    return parsed.success && parsed.data >= EARLIEST && parsed.data <= LATEST ? parsed.data : null;
  };
  const nextMonth = `${addDays(`${localDateAt(nowSec, zone).slice(0, 7)}-28`, 4).slice(0, 7)}-01`;
  const usual = { from: `${monthsBefore(nextMonth, MONTHS_SHOWN)}-01`, to: nextMonth };
  const asked = { from: date('from') ?? usual.from, to: date('to') ?? usual.to };
  const lengthDays = (Date.parse(asked.to) - Date.parse(asked.from)) / 86_400_000;
  const days = Number(searchParams.get('days'));
  const area = searchParams.get('area')?.slice(0, 80) ?? '';
  return {
    ...(lengthDays > 0 && lengthDays <= MOST_DAYS ? asked : usual),
    kind: COMPLAINT_KINDS.find((kind) => kind === searchParams.get('kind')) ?? null,
    area: area === '' ? null : area,
    measure: date('measure'),
    days: MEASURE_DAYS.find((known) => known === days) ?? 91,
  };
}

/** The period of a view, epoch seconds. */
export function numbersSpan({ from, to }: NumbersView, zone: string): { fromSec: number; toSec: number } {
  return { fromSec: startOfDaySec(from, zone), toSec: startOfDaySec(to, zone) };
}

function monthsBefore(date: LocalDate, months: number): string {
  const index = Number(date.slice(0, 4)) * 12 + Number(date.slice(5, 7)) - 1 - months;
  return `${Math.floor(index / 12)}-${String((index % 12) + 1).padStart(2, '0')}`;
}
