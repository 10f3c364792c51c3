import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { LimitAveraging } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import { windowsOf, type LimitWindow, type WindowRule } from '#lib/services/limits/windows';

const QUARTER_SEC = 900;
const at = (text: string) => Date.parse(text) / 1000;

function timelineOf(timeZone: string): NetworkSettings[] {
  return [
    {
      effectiveFromSec: 0,
      timeZone,
      scheme: { dayStartMin: 7 * 60, eveningStartMin: 19 * 60, nightStartMin: 23 * 60 },
      minimumCoverage: 0.75,
      rules: { maximumWindSpeedMs: 5, excludeRain: false },
    },
  ];
}

function rule(changes: Partial<WindowRule> = {}): WindowRule {
  return {
    averaging: '1h',
    windowMin: null,
    stepMin: null,
    weekdays: 127,
    holidays: 'as-weekday',
    holidayDates: new Set(),
    fromMin: null,
    toMin: null,
    effectiveFromSec: 0,
    withdrawnAt: null,
    ...changes,
  };
}

interface Civil {
  date: string;
  minute: number;
  offset: string;
}

const formatters = new Map<string, Intl.DateTimeFormat>();

/** What the clock and the calendar on the wall show: asked of Intl, not of the code under test. */
function civilAt(sec: number, timeZone: string): Civil {
  const formatter =
    formatters.get(timeZone) ??
    new Intl.DateTimeFormat('en-CA', {
      timeZone,
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
      hour: '2-digit',
      minute: '2-digit',
      hourCycle: 'h23',
      timeZoneName: 'longOffset',
    });
  formatters.set(timeZone, formatter);
  const parts = Object.fromEntries(
    formatter.formatToParts(sec * 1000).map(({ type, value }) => [type, value]),
  );
  return {
    date: `${parts['year']}-${parts['month']}-${parts['day']}`,
    minute: Number(parts['hour']) * 60 + Number(parts['minute']),
    offset: parts['timeZoneName'] ?? '',
  };
}

function dayBefore(date: string): string {
  return new Date(Date.parse(`${date}T12:00:00Z`) - 86_400_000).toISOString().slice(0, 10);
}

/** Which window a quarter-hour belongs to, by the words of the definition. Null: a period of day that is not asked for. */
function windowName({ date, minute, offset }: Civil, averaging: LimitAveraging): string | null {
  if (averaging === '15min') return `${date} ${minute} ${offset}`;
  if (averaging === '1h') return `${date} ${Math.floor(minute / 60)} ${offset}`;
  const kind = minute < 420 || minute >= 1380 ? 'night' : minute < 1140 ? 'day' : 'evening';
  return kind === averaging ? `${minute < 420 ? dayBefore(date) : date} ${kind}` : null;
}

/** Windows by looking at every quarter-hour: a run of those that belong together, judged by where it begins. */
function naiveWindows(asked: WindowRule, fromSec: number, toSec: number, zone: string): LimitWindow[] {
  const runs: (LimitWindow & { name: string; first: Civil })[] = [];
  for (let sec = fromSec - 172_800; sec < toSec + 172_800; sec += QUARTER_SEC) {
    const civil = civilAt(sec, zone);
    const name = windowName(civil, asked.averaging);
    const last = runs.at(-1);
    if (last && last.name === name && last.endSec === sec) last.endSec += QUARTER_SEC;
    else if (name !== null) runs.push({ name, first: civil, startSec: sec, endSec: sec + QUARTER_SEC });
  }
  return runs
    .filter(({ startSec }) => fromSec <= startSec && startSec < toSec && startSec >= asked.effectiveFromSec)
    .filter(({ startSec }) => !asked.withdrawnAt || startSec * 1000 < asked.withdrawnAt.getTime())
    .filter(({ first }) => {
      const weekday = (new Date(`${first.date}T12:00:00Z`).getUTCDay() + 6) % 7;
      if (((asked.weekdays >> weekday) & 1) === 0) return false;
      const { fromMin, toMin } = asked;
      if (fromMin === null || toMin === null) return true;
      const isLater = first.minute >= fromMin;
      const isEarlier = first.minute < toMin;
      return fromMin < toMin ? isLater && isEarlier : isLater || isEarlier;
    })
    .map(({ startSec, endSec }) => ({ startSec, endSec }));
}

/** Days around both clock changes, and an ordinary week, of zones that change by an hour, by half an hour, or never. */
const AROUND: [zone: string, day: string][] = [
  ['Europe/London', '2026-03-29'],
  ['Europe/London', '2026-10-25'],
  ['America/New_York', '2026-03-08'],
  ['America/New_York', '2026-11-01'],
  ['Australia/Lord_Howe', '2026-04-05'],
  ['Australia/Lord_Howe', '2026-10-04'],
  ['Asia/Kathmandu', '2026-06-10'],
  ['America/Sao_Paulo', '2018-11-04'],
];

describe('windows of a limit', () => {
  test(
    'are those that a look at every quarter-hour finds, through clock changes and across midnight',
    { timeout: 30_000 },
    () => {
      const minuteOfDay = fc.integer({ min: 0, max: 95 }).map((quarter) => quarter * 15);
      fc.assert(
        fc.property(
          fc.constantFrom(...AROUND),
          fc.constantFrom<LimitAveraging>('15min', '1h', 'day', 'evening', 'night'),
          fc.integer({ min: 1, max: 127 }),
          fc.option(fc.tuple(minuteOfDay, minuteOfDay)),
          fc.integer({ min: -96 * 2, max: 96 }),
          fc.integer({ min: 1, max: 96 * 4 }),
          fc.option(fc.integer({ min: -200, max: 200 })),
          fc.option(fc.integer({ min: -200, max: 200 })),
          ([zone, day], averaging, weekdays, clock, offset, length, effective, withdrawn) => {
            const origin = at(`${day}T00:00:00Z`);
            const fromSec = origin + offset * QUARTER_SEC;
            const toSec = fromSec + length * QUARTER_SEC;
            const asked = rule({
              averaging,
              weekdays,
              fromMin: clock?.[0] ?? null,
              toMin: clock?.[1] ?? null,
              effectiveFromSec: effective === null ? 0 : origin + effective * QUARTER_SEC + 1,
              withdrawnAt:
                withdrawn === null ? null : new Date((origin + withdrawn * QUARTER_SEC + 1) * 1000),
            });
            expect(windowsOf(asked, fromSec, toSec, timelineOf(zone))).toEqual(
              naiveWindows(asked, fromSec, toSec, zone),
            );
          },
        ),
        { numRuns: 300 },
      );
    },
  );

  test('the night of a clock change has 7 or 9 hours', () => {
    const hoursFrom = (day: string) =>
      windowsOf(
        rule({ averaging: 'night' }),
        at(`${day}T12:00:00Z`),
        at(`${day}T12:00:00Z`) + 86_400,
        timelineOf('Europe/London'),
      ).map(({ startSec, endSec }) => (endSec - startSec) / 3600);
    expect([hoursFrom('2026-03-28'), hoursFrom('2026-10-24'), hoursFrom('2026-06-01')]).toEqual([
      [7],
      [9],
      [8],
    ]);
  });

  test('the repeated hour is two windows, the skipped one none', () => {
    const starts = (from: string, to: string) =>
      windowsOf(rule(), at(from), at(to), timelineOf('Europe/London')).map(({ startSec }) =>
        new Date(startSec * 1000).toISOString().slice(11, 16),
      );
    // 25 October: 01:00 BST, 01:00 GMT; 29 March: 00:00 GMT is followed by 02:00 BST.
    expect(starts('2026-10-25T00:00:00Z', '2026-10-25T03:00:00Z')).toEqual(['00:00', '01:00', '02:00']);
    expect(starts('2026-03-29T00:00:00Z', '2026-03-29T03:00:00Z')).toEqual(['00:00', '01:00', '02:00']);
    const spring = windowsOf(
      rule({ fromMin: 60, toMin: 120 }),
      at('2026-03-29T00:00:00Z'),
      at('2026-03-30T00:00:00Z'),
      timelineOf('Europe/London'),
    );
    const autumn = windowsOf(
      rule({ fromMin: 60, toMin: 120 }),
      at('2026-10-25T00:00:00Z'),
      at('2026-10-26T00:00:00Z'),
      timelineOf('Europe/London'),
    );
    expect([spring.length, autumn.length]).toEqual([0, 2]);
  });

  test('a network without evening has no evening windows', () => {
    const [settings] = timelineOf('Europe/London');
    if (!settings) throw new Error('No settings.');
    const timeline = [{ ...settings, scheme: { ...settings.scheme, eveningStartMin: null } }];
    const of = (averaging: LimitAveraging) =>
      windowsOf(rule({ averaging }), at('2026-06-01T00:00:00Z'), at('2026-06-02T00:00:00Z'), timeline).length;
    expect([of('day'), of('evening'), of('night')]).toEqual([1, 0, 1]);
  });
});
