import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { NetworkSettings } from '#db/queries/networks';
import { energyOfDb } from '#lib/acoustics/energy';
import { headroomDb, isCertainToPass } from '#lib/acoustics/headroom';
import { secondsOf } from '#lib/services/headroom/windowSeconds';
import { windowsOf, type WindowRule } from '#lib/services/limits/windows';

const ALWAYS = {
  windowMin: null,
  stepMin: null,
  weekdays: 127,
  holidays: 'as-weekday',
  holidayDates: new Set<string>(),
  fromMin: null,
  toMin: null,
  effectiveFromSec: 0,
  withdrawnAt: null,
} as const;

/** Windows with a clock change in them, and their true lengths in hours. */
const CASES: [zone: string, at: string, rule: Pick<WindowRule, 'averaging' | 'windowMin'>, hours: number][] =
  [
    ['Europe/London', '2026-03-29T00:30:00Z', { averaging: 'night', windowMin: null }, 7],
    ['Europe/London', '2026-10-25T00:30:00Z', { averaging: 'night', windowMin: null }, 9],
    ['Europe/London', '2026-03-29T02:00:00Z', { averaging: 'length', windowMin: 240 }, 3],
    ['Europe/London', '2026-10-25T01:30:00Z', { averaging: 'length', windowMin: 240 }, 5],
    ['Australia/Lord_Howe', '2026-04-04T15:10:00Z', { averaging: 'night', windowMin: null }, 8.5],
    ['Australia/Lord_Howe', '2026-10-03T15:10:00Z', { averaging: 'night', windowMin: null }, 7.5],
  ];

function timelineOf(timeZone: string): NetworkSettings[] {
  const scheme = { dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1380 };
  const rules = { maximumWindSpeedMs: 5, excludeRain: false };
  return [{ effectiveFromSec: 0, timeZone, scheme, minimumCoverage: 0.75, rules }];
}

test.each(CASES)(
  'in %s at %s, whatever was measured so far, a rest at the headroom ends the window at the limit',
  (zone, at, rule, hours) => {
    const atSec = Date.parse(at) / 1000;
    const windows = windowsOf({ ...ALWAYS, ...rule }, atSec - 86_400, atSec + 1, timelineOf(zone));
    const window = windows.find(({ startSec, endSec }) => startSec <= atSec && atSec < endSec);
    if (!window) throw new Error('There is no such window.');
    const { startSec, endSec } = window;
    expect((endSec - startSec) / 3600).toBe(hours);
    const minutes = (endSec - startSec) / 60;
    /** Minutes so far: a level, or nothing; then how many of them the monitor has not sent yet. */
    const soFar = fc.array(fc.option(fc.integer({ min: 250, max: 900 }), { freq: 8 }), {
      maxLength: minutes - 1,
    });
    fc.assert(
      fc.property(
        soFar,
        fc.integer({ min: 0, max: 30 }),
        fc.integer({ min: 300, max: 800 }),
        (levels, awaited, thresholdTenths) => {
          const measured = levels.slice(0, Math.max(0, levels.length - awaited));
          const known = measured.filter((tenths) => tenths !== null);
          const newestMinute = measured.findLastIndex((tenths) => tenths !== null) + 1;
          const validSec = known.length * 60;
          const { restFromSec } = secondsOf(window, {
            nowSec: startSec + levels.length * 60,
            newestSec: newestMinute === 0 ? null : startSec + newestMinute * 60,
            validSec,
            minimumCoverage: 0.75,
          });
          const energySec = known.reduce((sum, tenths) => sum + 60 * energyOfDb(tenths / 10), 0);
          const sums = { energySec, validSec, restSec: endSec - restFromSec };
          const levelDb = headroomDb(thresholdTenths, sums);
          fc.pre(!isCertainToPass(thresholdTenths, sums) && levelDb !== null);
          // The whole window minute by minute: what was measured, and the rest of its clock at that level.
          const rest = Array.from({ length: minutes - newestMinute }, () => levelDb ?? NaN);
          const all = [...known.map((tenths) => tenths / 10), ...rest];
          const endDb = 10 * Math.log10(all.reduce((sum, db) => sum + 10 ** (db / 10), 0) / all.length);
          expect(Math.abs(endDb - thresholdTenths / 10)).toBeLessThanOrEqual(0.05);
        },
      ),
      { numRuns: 40 },
    );
  },
);
