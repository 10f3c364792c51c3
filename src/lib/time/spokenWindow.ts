import { wallInstants } from './wallInstants';
import { addDays, instantAtSec, isLocalDate, localDateAt, weekdayOf, type LocalDate } from './zone';

/** "About three" is taken as this much before and after, seconds. */
const ABOUT_SEC = 1800;
const NOON_MIN = 720;
const DAY_MIN = 1440;
const USUAL_LASTING_MIN = 30;
const MOST_LASTING_MIN = 7 * DAY_MIN;
const WEEKDAYS = ['mon', 'tue', 'wed', 'thu', 'fri', 'sat', 'sun'];
const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];
const CLOCK = '(?:noon|midnight|\\d{1,2}(?:[:.]?[0-5]\\d)?\\s?(?:am|pm)?)';
const RANGE = new RegExp(`^(?:(.*?)\\s+)?(${CLOCK})\\s?-\\s?(${CLOCK})$`);
const ABOUT = new RegExp(`^(?:(.*?)\\s+)?(${CLOCK})$`);
const NOW = /^now(?:\s+(\d{1,3})\s?(m|min|minutes|h|hours?)?)?$/;

/** Half-open, epoch seconds. */
export interface SpokenWindow {
  fromSec: number;
  toSec: number;
}

/**
 * The window that words at a telephone mean, in a zone: "now", "now 45", "last night about 3", "yesterday 14:30-15", "mon 22-1",
 * "17 mar 3:10", "2026-03-17 03:10-03:40", "3am" (the last time that it was three). A time alone is half an hour before and after it;
 * an end before its beginning is the next date's. Nothing reaches beyond now. Of the hour that comes twice in autumn both are taken
 * in; what the spring change skips is just after it. Null: not understood, or not yet come.
 */
export function spokenWindow(text: string, zone: string, nowSec: number): SpokenWindow | null {
  const said = plain(text);
  const endSec = Math.ceil(nowSec / 60) * 60;
  const now = NOW.exec(said);
  if (now) {
    const minutes = Number(now[1] ?? USUAL_LASTING_MIN) * (now[2]?.startsWith('h') ? 60 : 1);
    return minutes < 1 || minutes > MOST_LASTING_MIN
      ? null
      : { fromSec: endSec - minutes * 60, toSec: endSec };
  }
  const [, day, fromText, toText] = RANGE.exec(said) ?? ABOUT.exec(said) ?? [];
  const fromMin = minutesOf(fromText);
  const toMin = toText === undefined ? null : minutesOf(toText);
  if (fromMin === null || (toText !== undefined && toMin === null)) return null;
  const date = dateMeant(day?.trim() ?? '', fromMin, zone, nowSec);
  if (date === null) return null;
  const begins = wallInstants(date, fromMin, zone);
  const ends = toMin === null ? begins : wallInstants(toMin > fromMin ? date : addDays(date, 1), toMin, zone);
  const slackSec = toMin === null ? ABOUT_SEC : 0;
  const fromSec = Math.min(...begins) - slackSec;
  const toSec = Math.min(Math.max(...ends) + slackSec, endSec);
  return Math.min(...begins) > nowSec || toSec <= fromSec ? null : { fromSec, toSec };
}

/** Lower case, without the small words that change nothing. */
function plain(text: string): string {
  return text
    .toLowerCase()
    .replace(/[–—]/g, '-')
    .replace(/\s+(?:to|until|till)\s+/g, '-')
    .replace(/\b(?:about|around|at|from|on|ca|the|o'clock)\b|,/g, ' ')
    .replace(/\s*-\s*(?=\d{1,2}[:.\s]|\d{1,4}$|\d{1,2}\s?[ap]m|noon|midnight)/g, (dash) => dash.trim())
    .replace(/\s+/g, ' ')
    .trim();
}

function minutesOf(text: string | undefined): number | null {
  if (text === 'noon') return NOON_MIN;
  if (text === 'midnight') return 0;
  const [, digits = '', minute, half] = /^(\d{1,2})(?:[:.]?([0-5]\d))?\s?(am|pm)?$/.exec(text ?? '') ?? [];
  if (digits === '') return null;
  const hour = Number(digits);
  if (half ? hour < 1 || hour > 12 : hour > 23) return null;
  const hourOfDay = half ? (hour % 12) + (half === 'pm' ? 12 : 0) : hour;
  return hourOfDay * 60 + Number(minute ?? 0);
}

/** The date on which the clock showed a time, as somebody names the day; null: not understood. */
function dateMeant(day: string, minutes: number, zone: string, nowSec: number): LocalDate | null {
  const today = localDateAt(nowSec, zone);
  const latest = instantAtSec(today, minutes, zone) > nowSec ? addDays(today, -1) : today;
  switch (day) {
    case '':
      return latest;
    case 'today':
    case 'this morning':
      return today;
    case 'yesterday':
    case 'yesterday evening':
      return addDays(today, -1);
    // Of a night its evening is yesterday's, and its small hours are today's as soon as they have come.
    case 'ln':
    case 'last night':
    case 'tonight':
      return minutes < NOON_MIN ? latest : addDays(today, -1);
  }
  const weekday = WEEKDAYS.findIndex((name) => day.slice(0, 3) === name);
  if (weekday >= 0 && /^[a-z]+$/.test(day)) return addDays(latest, -((weekdayOf(latest) - weekday + 7) % 7));
  return namedDate(day, latest);
}

/** "2026-03-17", "17.3.", "17 mar", "17 march 2025"; without a year the last time that the date was. */
function namedDate(day: string, latest: LocalDate): LocalDate | null {
  if (isLocalDate(day)) return day;
  const [, date = '', monthText = '', year] =
    /^(\d{1,2})(?:\.\s?|\s)(\d{1,2}|[a-z]{3,9})\.?(?:\s?(\d{4}))?$/.exec(day) ?? [];
  const month = /^\d/.test(monthText) ? Number(monthText) : MONTHS.indexOf(monthText.slice(0, 3)) + 1;
  if (date === '' || month < 1) return null;
  const inYear = (of: number) =>
    `${of}-${String(month).padStart(2, '0')}-${String(Number(date)).padStart(2, '0')}`;
  const thisYear = Number(latest.slice(0, 4));
  const meant = inYear(year ? Number(year) : inYear(thisYear) > latest ? thisYear - 1 : thisYear);
  return isLocalDate(meant) ? meant : null;
}
