import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { NetworkSettings } from '#db/queries/networks';
import { FIXED_LENGTHS_MIN } from '#lib/contracts/limitWindows';
import { runDateOf } from '#lib/services/limits/runs';
import { windowsOf, type LimitWindow, type WindowRule } from '#lib/services/limits/windows';

const GRAIN_SEC = 300;
const at = (text: string) => Date.parse(text) / 1000;

/** Days around clock changes by an hour and by half an hour, one at midnight, and a zone that never changes. */
const AROUND: [zone: string, day: string][] = [
  ['Europe/London', '2026-03-29'],
  ['Europe/London', '2026-10-25'],
  ['America/New_York', '2026-03-08'],
  ['Australia/Lord_Howe', '2026-04-05'],
  ['Australia/Lord_Howe', '2026-10-04'],
  ['America/Sao_Paulo', '2018-11-04'],
  ['Asia/Kathmandu', '2026-06-10'],
];

function timelineOf(timeZone: string): NetworkSettings[] {
  return [
    {
      effectiveFromSec: 0,
      timeZone,
      scheme: { dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1380 },
      minimumCoverage: 0.75,
      rules: { maximumWindSpeedMs: 5, excludeRain: false },
    },
  ];
}

const RULE: WindowRule = {
  averaging: 'length',
  windowMin: 60,
  stepMin: null,
  weekdays: 127,
  holidays: 'as-weekday',
  holidayDates: new Set(),
  fromMin: null,
  toMin: null,
  effectiveFromSec: 0,
  withdrawnAt: null,
};

interface Shown {
  sec: number;
  date: string;
  minute: number;
  offset: string;
}

/** What the clock and the calendar on the wall show every five minutes: asked of Intl, not of the code under test. */
function shownBetween(fromSec: number, toSec: number, timeZone: string): Shown[] {
  const formatter = new Intl.DateTimeFormat('en-CA', {
    timeZone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZoneName: 'longOffset',
  });
  const shown: Shown[] = [];
  for (let sec = fromSec; sec < toSec; sec += GRAIN_SEC) {
    const parts = Object.fromEntries(
      formatter.formatToParts(sec * 1000).map(({ type, value }) => [type, value]),
    );
    shown.push({
      sec,
      date: `${parts['year']}-${parts['month']}-${parts['day']}`,
      minute: Number(parts['hour']) * 60 + Number(parts['minute']),
      offset: parts['timeZoneName'] ?? '',
    });
  }
  return shown;
}

type Naive = LimitWindow & { first: Shown };

/** Fixed windows by the words of their definition: an hour that comes twice makes short windows twice, a long one longer. */
function naiveFixed(shown: readonly Shown[], lengthMin: number): Naive[] {
  const windows: (Naive & { name: string })[] = [];
  const latest = new Map<string, number>();
  for (const one of shown) {
    const place = Math.max(
      Math.floor(one.minute / lengthMin),
      lengthMin > 60 ? (latest.get(one.date) ?? 0) : 0,
    );
    latest.set(one.date, place);
    const name = lengthMin > 60 ? `${one.date} ${place}` : `${one.date} ${place} ${one.offset}`;
    const last = windows.at(-1);
    if (last?.name === name) last.endSec = one.sec + GRAIN_SEC;
    else windows.push({ name, first: one, startSec: one.sec, endSec: one.sec + GRAIN_SEC });
  }
  return windows;
}

function naiveRolling(shown: readonly Shown[], lengthMin: number, stepMin: number): Naive[] {
  const midnights = new Map<string, number>();
  for (const { date, sec } of shown) if (!midnights.has(date)) midnights.set(date, sec);
  return shown
    .filter(({ date, sec }) => (sec - (midnights.get(date) ?? 0)) % (stepMin * 60) === 0)
    .map((first) => ({ first, startSec: first.sec, endSec: first.sec + lengthMin * 60 }));
}

function naiveHours(shown: readonly Shown[], fromMin: number, toMin: number): Naive[] {
  const dates = [...new Set(shown.map(({ date }) => date))];
  const firstAt = (date: string | undefined, minute: number) =>
    shown.find(
      (one) => (one.date === date && one.minute >= minute) || (date !== undefined && one.date > date),
    );
  return dates.flatMap((date, at) => {
    const first = firstAt(date, fromMin);
    const end = toMin > fromMin ? firstAt(date, toMin) : firstAt(dates[at + 1], toMin);
    return first && end && end.sec > first.sec ? [{ first, startSec: first.sec, endSec: end.sec }] : [];
  });
}

const isWithin = (minute: number, fromMin: number, toMin: number) =>
  fromMin < toMin ? fromMin <= minute && minute < toMin : minute >= fromMin || minute < toMin;

const hour = fc.integer({ min: 0, max: 23 }).map((of) => of * 60);
const shapes = fc.oneof(
  fc
    .constantFrom(...FIXED_LENGTHS_MIN)
    .map((lengthMin) => ({ kind: 'fixed' as const, lengthMin, stepMin: 0 })),
  fc
    .tuple(fc.integer({ min: 2, max: 288 }), fc.constantFrom(5, 15))
    .map(([grains, stepMin]) => ({ kind: 'rolling' as const, lengthMin: grains * 5 + 10, stepMin })),
  fc.constant({ kind: 'hours' as const, lengthMin: 0, stepMin: 0 }),
);

test('windows of any length, fixed, rolling or of own hours, are those that a look at every five minutes finds', () => {
  fc.assert(
    fc.property(
      fc.constantFrom(...AROUND),
      shapes,
      fc.tuple(hour, hour).filter(([from, to]) => from !== to),
      fc.boolean(),
      fc.integer({ min: 1, max: 127 }),
      ([zone, day], { kind, lengthMin, stepMin }, [fromMin, toMin], hasClock, weekdays) => {
        const origin = at(`${day}T00:00:00Z`);
        const [fromSec, toSec] = [origin - 86_400, origin + 2 * 86_400];
        const hasHours = kind === 'hours' || hasClock;
        const rule: WindowRule = {
          ...RULE,
          averaging: kind === 'hours' ? 'hours' : 'length',
          windowMin: kind === 'hours' ? null : lengthMin,
          stepMin: kind === 'rolling' ? stepMin : null,
          weekdays,
          fromMin: hasHours ? fromMin : null,
          toMin: hasHours ? toMin : null,
        };
        const shown = shownBetween(fromSec - 3 * 86_400, toSec + 3 * 86_400, zone);
        const all =
          kind === 'fixed'
            ? naiveFixed(shown, lengthMin)
            : kind === 'rolling'
              ? naiveRolling(shown, lengthMin, stepMin)
              : naiveHours(shown, fromMin, toMin);
        const expected = all
          .filter(({ startSec }) => fromSec <= startSec && startSec < toSec)
          .filter(
            ({ first }) =>
              ((weekdays >> ((new Date(`${first.date}T12:00:00Z`).getUTCDay() + 6) % 7)) & 1) === 1,
          )
          .filter(({ first }) => kind === 'hours' || !hasHours || isWithin(first.minute, fromMin, toMin))
          .map(({ startSec, endSec }) => ({ startSec, endSec }));
        expect(windowsOf(rule, fromSec, toSec, timelineOf(zone))).toEqual(expected);
      },
    ),
    { numRuns: 80 },
  );
}, 60_000);

test('named dates are Sundays, left out, or the only ones', () => {
  // 3 April 2026 is a Friday.
  const startsOf = (changes: Partial<WindowRule>) =>
    windowsOf(
      { ...RULE, averaging: 'day', windowMin: null, holidayDates: new Set(['2026-04-03']), ...changes },
      at('2026-04-02T00:00:00Z'),
      at('2026-04-06T00:00:00Z'),
      timelineOf('Europe/London'),
    ).map(({ startSec }) => new Date(startSec * 1000).getUTCDate());
  const [weekend, workdays] = [0b1100000, 0b0011111];
  expect(startsOf({ weekdays: workdays })).toEqual([2, 3]);
  expect(startsOf({ weekdays: workdays, holidays: 'as-sunday' })).toEqual([2]);
  expect(startsOf({ weekdays: weekend, holidays: 'as-sunday' })).toEqual([3, 4, 5]);
  expect(startsOf({ weekdays: 127, holidays: 'never' })).toEqual([2, 4, 5]);
  expect(startsOf({ weekdays: weekend, holidays: 'only' })).toEqual([3]);
});

test('rolling windows across midnight belong to the date on which their hours began', () => {
  const date = (clock: string, fromMin: number | null, toMin: number | null) =>
    runDateOf({ fromMin, toMin }, at(`2026-01-15T${clock}:00Z`), timelineOf('Europe/London'));
  expect(date('02:00', 1320, 360)).toBe('2026-01-14');
  expect(date('23:00', 1320, 360)).toBe('2026-01-15');
  expect(date('02:00', null, null)).toBe('2026-01-15');
});
