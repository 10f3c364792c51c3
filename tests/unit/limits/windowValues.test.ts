import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { StoredInterval } from '#db/queries/intervals';
import { accumulate } from '#lib/services/levels/accumulate';
import { measure, type MetricRule } from '#lib/services/limits/measure';
import { windowsOf, type LimitWindow } from '#lib/services/limits/windows';
import { partsOf } from '#lib/services/limitTrial/parts';
import { WindowSums } from '#lib/services/limitTrial/windowSums';
import {
  ALL_DAY,
  AROUND,
  BAND_INDEX,
  intervalsOf,
  lengths,
  stretches,
  timelineOf,
  WINDY_MS,
} from './support/series';

const NO_BAND = { bandFraction: null, bandIndex: null };
const METRICS: MetricRule[] = [
  { metric: 'LAeq', ...NO_BAND },
  { metric: 'LAFmax', ...NO_BAND },
  { metric: 'LAE', ...NO_BAND },
  { metric: 'LCeqLessLAeq', ...NO_BAND },
  { metric: 'bandLeq', bandFraction: 3, bandIndex: BAND_INDEX },
];

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
      return meanOf(({ levelsCentiDb: [, level = -32768] }) => (level === -32768 ? null : level));
    default:
      return laeq;
  }
}

function isSame(found: Value, expected: Value): boolean {
  if (Math.abs(found.validSec - expected.validSec) > 1e-6) return false;
  if (found.levelDb === null || expected.levelDb === null) return found.levelDb === expected.levelDb;
  return Math.abs(found.levelDb - expected.levelDb) < 1e-6;
}

test(
  'values of fixed and rolling windows are those of the definition, whatever is missing and however the clock changes',
  { timeout: 60_000 },
  () => {
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
          const ofRule = partsOf(rule);
          if (ofRule === null) throw new Error(`${rule.metric} is not told by sums.`);
          const sums = new WindowSums(parts, { parts: ofRule, partSec });
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
  },
);
