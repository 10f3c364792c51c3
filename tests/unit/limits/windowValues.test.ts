import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { StoredInterval } from '#db/queries/intervals';
import type { NetworkSettings } from '#db/queries/networks';
import { FLAGS } from '#lib/acoustics/validity';
import { FIXED_LENGTHS_MIN } from '#lib/contracts/limitWindows';
import { accumulate } from '#lib/services/levels/accumulate';
import { measure, type MetricRule } from '#lib/services/limits/measure';
import { windowsOf, type LimitWindow, type WindowRule } from '#lib/services/limits/windows';
import { WindowSums } from '#lib/services/limitTrial/windowSums';

const WINDY_MS = 5;
const BAND_INDEX = -10;
const AROUND: [zone: string, day: string][] = [
  ['Europe/London', '2026-03-29'],
  ['Europe/London', '2026-10-25'],
  ['Australia/Lord_Howe', '2026-04-05'],
  ['Asia/Kathmandu', '2026-06-10'],
];
const ALL_DAY: WindowRule = {
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
const NO_BAND = { bandFraction: null, bandIndex: null };
const METRICS: MetricRule[] = [
  { metric: 'LAeq', ...NO_BAND },
  { metric: 'LAFmax', ...NO_BAND },
  { metric: 'LAE', ...NO_BAND },
  { metric: 'LCeqLessLAeq', ...NO_BAND },
  { metric: 'bandLeq', bandFraction: 3, bandIndex: BAND_INDEX },
];

/** Rolling windows of any length, or fixed ones of those that tile the day. */
const lengths = fc.oneof(
  fc
    .tuple(fc.integer({ min: 2, max: 36 }), fc.constantFrom(5, 15))
    .filter(([fives, stepMin]) => fives * 5 > stepMin)
    .map(([fives, stepMin]) => ({ windowMin: fives * 5, stepMin })),
  fc.constantFrom(...FIXED_LENGTHS_MIN).map((windowMin) => ({ windowMin, stepMin: null })),
);

/** Stretches of a monitor: silence, then intervals of one length at levels of their own. */
const stretches = fc.array(
  fc.record({
    gapSec: fc.constantFrom(0, 0, 1, 60, 299, 3000, 20_000),
    durationSec: fc.constantFrom(60, 300, 420, 900, 3600),
    levels: fc.array(
      fc.record({
        laeqCentiDb: fc.integer({ min: 2000, max: 9500 }),
        aboveCentiDb: fc.option(fc.integer({ min: 0, max: 2500 })),
        lceqCentiDb: fc.option(fc.integer({ min: 2000, max: 9900 })),
        bandCentiDb: fc.option(fc.integer({ min: 0, max: 9000 })),
        windSpeedMs: fc.constantFrom(null, 2, 5, 5.01),
        flags: fc.constantFrom(0, 0, 0, FLAGS.overload),
      }),
      { maxLength: 30 },
    ),
  }),
  { maxLength: 12 },
);

type Stretch = typeof stretches extends fc.Arbitrary<infer S> ? S : never;

function intervalsOf(made: Stretch, fromSec: number): StoredInterval[] {
  const intervals: StoredInterval[] = [];
  let startSec = fromSec;
  for (const { gapSec, durationSec, levels } of made) {
    startSec += gapSec;
    for (const { aboveCentiDb, bandCentiDb, laeqCentiDb, ...rest } of levels) {
      intervals.push({
        ...NOTHING_ELSE,
        ...rest,
        startSec,
        durationSec,
        laeqCentiDb,
        lafmaxCentiDb: aboveCentiDb === null ? null : laeqCentiDb + aboveCentiDb,
        bandIndices: BANDS,
        levelsCentiDb: Int16Array.of(bandCentiDb ?? -32768),
      });
      startSec += durationSec;
    }
  }
  return intervals;
}

const BANDS = Int8Array.of(BAND_INDEX);
const NOTHING_ELSE = {
  lafminCentiDb: null,
  lcpeakCentiDb: null,
  bandSetId: 1,
  bandFraction: 3,
  windDirectionDeg: null,
  temperatureC: null,
  batteryV: null,
  receivedAtSec: 0,
} as const;

interface Value {
  levelDb: number | null;
  validSec: number;
}

/** The value of a window as the definition has it: each valid interval by its seconds within, nothing kept from one window to the next. */
function defined({ metric }: MetricRule, { startSec, endSec }: LimitWindow, all: StoredInterval[]): Value {
  const within = all
    .filter(({ flags, windSpeedMs }) => flags === 0 && (windSpeedMs ?? 0) <= WINDY_MS)
    .map((interval) => ({
      ...interval,
      sec: Math.min(endSec, interval.startSec + interval.durationSec) - Math.max(startSec, interval.startSec),
    }))
    .filter(({ sec }) => sec > 0);
  const meanOf = (levelOf: (interval: StoredInterval) => number | null): Value => {
    const told = within.filter((interval) => levelOf(interval) !== null);
    const validSec = told.reduce((sum, { sec }) => sum + sec, 0);
    const energy = told.reduce((sum, one) => sum + one.sec * 10 ** ((levelOf(one) ?? 0) / 1000), 0);
    return { validSec, levelDb: validSec === 0 ? null : 10 * Math.log10(energy / validSec) };
  };
  const laeq = meanOf(({ laeqCentiDb }) => laeqCentiDb);
  switch (metric) {
    case 'LAFmax': {
      const maxima = within.flatMap(({ lafmaxCentiDb }) => (lafmaxCentiDb === null ? [] : [lafmaxCentiDb]));
      return { ...laeq, levelDb: maxima.length === 0 ? null : Math.max(...maxima) / 100 };
    }
    case 'LAE':
      return {
        ...laeq,
        levelDb: laeq.levelDb === null ? null : laeq.levelDb + 10 * Math.log10(laeq.validSec),
      };
    case 'LCeqLessLAeq': {
      const lceq = meanOf(({ lceqCentiDb }) => lceqCentiDb);
      const isTold = lceq.levelDb !== null && laeq.levelDb !== null;
      return { ...lceq, levelDb: isTold ? (lceq.levelDb ?? 0) - (laeq.levelDb ?? 0) : null };
    }
    case 'bandLeq':
      return meanOf(({ levelsCentiDb: [level = -32768] }) => (level === -32768 ? null : level));
    default:
      return laeq;
  }
}

function timelineOf(timeZone: string): NetworkSettings[] {
  return [
    {
      effectiveFromSec: 0,
      timeZone,
      scheme: { dayStartMin: 420, eveningStartMin: 1140, nightStartMin: 1380 },
      minimumCoverage: 0.75,
      rules: { maximumWindSpeedMs: WINDY_MS, excludeRain: false },
    },
  ];
}

function isSame(found: Value, expected: Value): boolean {
  if (Math.abs(found.validSec - expected.validSec) > 1e-6) return false;
  if (found.levelDb === null || expected.levelDb === null) return found.levelDb === expected.levelDb;
  return Math.abs(found.levelDb - expected.levelDb) < 1e-6;
}

test('values of fixed and rolling windows are those of the definition, whatever is missing and however the clock changes', () => {
  fc.assert(
    fc.property(fc.constantFrom(...AROUND), lengths, stretches, (around, length, made) => {
      const [zone, day] = around;
      const fromSec = Date.parse(`${day}T00:00:00Z`) / 1000 - 43_200;
      const toSec = fromSec + 2 * 86_400;
      const timeline = timelineOf(zone);
      const intervals = intervalsOf(made, fromSec - 1800);
      const windows = windowsOf({ ...ALL_DAY, ...length }, fromSec, toSec, timeline);
      const isOfQuarters = windows.every(
        ({ startSec, endSec }) => startSec % 900 === 0 && endSec % 900 === 0,
      );
      const partSec = isOfQuarters ? 900 : 300;
      const judgement = { validity: 'rules' as const, timeline, exclusions: [] };
      const parts = [];
      for (let startSec = fromSec - 86_400; startSec < toSec + 86_400; startSec += partSec) {
        const part = { fromSec: startSec, toSec: startSec + partSec };
        const { sums } = accumulate(intervals, part, judgement, { bandClasses: false });
        if (sums.validSec > 0) parts.push({ startSec, sums });
      }
      const wrong: object[] = [];
      for (const rule of METRICS) {
        const isOfEnergies = rule.metric === 'LAeq' || rule.metric === 'LAFmax' || rule.metric === 'LAE';
        const sums = new WindowSums(parts, { parts: isOfEnergies ? 'energies' : 'bands', partSec });
        for (const window of windows) {
          const found = measure(rule, sums.of(window));
          const expected = defined(rule, window, intervals);
          if (!isSame(found, expected)) wrong.push({ metric: rule.metric, window, found, expected });
        }
      }
      expect(wrong).toEqual([]);
    }),
    { numRuns: 25 },
  );
});
