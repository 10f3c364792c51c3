import { DateTime } from 'luxon';
import { addDays, localDateAt, localMinuteAt, type LocalDate } from '#lib/time/zone';
import type { ReportWords } from './words/en';

const DAYS_BACK = 7;
const NIGHTS_BACK = 3;
/** Until then a person who is still awake means the night before by "last night". */
const SMALL_HOURS_END_MIN = 300;

/** Days and nights that a resident may choose, newest first; values as `reportWindow` reads them. */
export function dayChoices(
  words: ReportWords,
  nowSec: number,
  zone: string,
): { value: string; label: string }[] {
  const today = localDateAt(nowSec, zone);
  const newestEvening = addDays(today, -1);
  const isSmallHours = localMinuteAt(nowSec, zone) < SMALL_HOURS_END_MIN;
  const nights = Array.from({ length: NIGHTS_BACK }, (_, back) => {
    const evening = addDays(newestEvening, -back);
    const say = back === 0 && !isSmallHours ? words.lastNight : words.night;
    return {
      value: `night-${evening}`,
      label: say(weekday(evening, words), dayName(addDays(evening, 1), words, 'short')),
    };
  });
  const days = Array.from({ length: DAYS_BACK }, (_, back) => {
    const date = addDays(today, -back);
    const name = dayName(date, words);
    const label = back === 0 ? words.today(name) : back === 1 ? words.yesterday(name) : name;
    return { value: date, label };
  });
  return [...nights, ...days];
}

/** A window in the resident's language; across a clock change each end names its offset. */
export function windowInWords(
  { fromSec, toSec }: { fromSec: number; toSec: number },
  zone: string,
  words: ReportWords,
): { text: string; isClockChange: boolean } {
  const [from, to] = [fromSec, toSec].map((sec) =>
    DateTime.fromSeconds(sec, { zone, locale: words.locale }),
  ) as [DateTime, DateTime];
  const isClockChange = from.offset !== to.offset;
  const clock = isClockChange ? "HH:mm '(UTC'Z')'" : 'HH:mm';
  const end = from.hasSame(to, 'day') ? to.toFormat(clock) : `${longDate(to)}, ${to.toFormat(clock)}`;
  return { text: `${longDate(from)}, ${from.toFormat(clock)} – ${end}`, isClockChange };
}

/** An instant in the resident's language. */
export function instantInWords(sec: number, zone: string, words: ReportWords): string {
  const at = DateTime.fromSeconds(sec, { zone, locale: words.locale });
  return `${longDate(at)}, ${at.toFormat('HH:mm')}`;
}

/** A civil date in the resident's language. */
export function dateInWords(date: LocalDate, words: ReportWords): string {
  return longDate(DateTime.fromISO(date, { zone: 'utc', locale: words.locale }));
}

function longDate(at: DateTime): string {
  return at.toLocaleString({ weekday: 'long', day: 'numeric', month: 'long', year: 'numeric' });
}

function weekday(date: LocalDate, { locale }: ReportWords): string {
  return DateTime.fromISO(date, { zone: 'utc', locale }).toLocaleString({ weekday: 'short' });
}

function dayName(date: LocalDate, { locale }: ReportWords, weekday: 'long' | 'short' = 'long'): string {
  return DateTime.fromISO(date, { zone: 'utc', locale }).toLocaleString({
    weekday,
    day: 'numeric',
    month: 'long',
  });
}
