import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { StoredInterval } from '#db/queries/intervals';
import type { Judgement } from '#lib/services/levels/accumulate';
import { accumulate } from '#lib/services/levels/accumulate';
import { eventMeasureOf, tonalShareOf } from '#lib/services/limits/intervalMeasures';
import { measure, type MetricRule } from '#lib/services/limits/measure';
import { windowsOf, type LimitWindow } from '#lib/services/limits/windows';
import { WindowSums } from '#lib/services/limitTrial/windowSums';
import {
  ALL_DAY,
  AROUND,
  intervalsOf,
  lengths,
  stretches,
  stretchesOf,
  timelineOf,
  WINDY_MS,
} from './support/series';

/** L_N, levels above a background, events and tones against their definitions, evaluated window by window without any sums. */
const NO_BAND = { bandFraction: null, bandIndex: null };
const NONE = -32768;

interface Part extends StoredInterval {
  /** Seconds within the window. */
  sec: number;
}

const isCounted = ({ flags, windSpeedMs }: StoredInterval) => flags === 0 && (windSpeedMs ?? 0) <= WINDY_MS;
const tenthsOf = (centiDb: number) => Math.floor(centiDb / 10 + 0.5);
const energyOf = (centiDb: number) => 10 ** (centiDb / 1000);

function partsWithin(all: readonly StoredInterval[], fromSec: number, toSec: number): Part[] {
  return all
    .map((one) => ({
      ...one,
      sec: Math.min(toSec, one.startSec + one.durationSec) - Math.max(fromSec, one.startSec),
    }))
    .filter(({ sec }) => sec > 0);
}

const secondsOf = (parts: readonly Part[]) => parts.reduce((sum, { sec }) => sum + sec, 0);

/** The smallest level that is exceeded for no more than N per cent of the time; null of too few samples, or of unequal ones. */
function exceeded(parts: readonly Part[], percent: number): number | null {
  const [length] = parts.map(({ durationSec }) => durationSec);
  const total = secondsOf(parts);
  if (length === undefined || parts.some(({ durationSec }) => durationSec !== length)) return null;
  if (total * Math.min(percent, 100 - percent) < 300 * length) return null;
  const levels = parts.map(({ laeqCentiDb }) => tenthsOf(laeqCentiDb)).sort((a, b) => a - b);
  const aboveSec = (tenths: number) =>
    secondsOf(parts.filter(({ laeqCentiDb }) => tenthsOf(laeqCentiDb) > tenths));
  return (levels.find((tenths) => aboveSec(tenths) * 100 <= percent * total) ?? NaN) / 10;
}

function aboveBackground(parts: readonly Part[], percent: number): number | null {
  const background = exceeded(parts, percent);
  if (background === null) return null;
  const energy = parts.reduce((sum, { sec, laeqCentiDb }) => sum + sec * energyOf(laeqCentiDb), 0);
  return 10 * Math.log10(energy / secondsOf(parts)) - background;
}

interface Happening {
  fromSec: number;
  toSec: number;
}

/** Events of the intervals that begin within the window. */
function happenings(all: readonly StoredInterval[], { startSec, endSec }: LimitWindow, rule: EventCase) {
  const within = all.filter((one) => startSec <= one.startSec && one.startSec < endSec);
  const events: Happening[] = [];
  for (const one of within) {
    if (!isCounted(one) || tenthsOf(one.laeqCentiDb) <= rule.eventTenths) continue;
    const last = events.at(-1);
    const toSec = one.startSec + one.durationSec;
    if (last && one.startSec - last.toSec <= rule.eventGapSec) last.toSec = toSec;
    else events.push({ fromSec: one.startSec, toSec });
  }
  return events
    .filter(({ fromSec, toSec }) => toSec - fromSec >= rule.eventMinimumSec)
    .map(({ fromSec, toSec }) => {
      const inside = within.filter(
        (one) => isCounted(one) && fromSec <= one.startSec && one.startSec + one.durationSec <= toSec,
      );
      const exposure = inside.reduce((sum, one) => sum + one.durationSec * energyOf(one.laeqCentiDb), 0);
      return 10 * Math.log10(exposure);
    });
}

/** Per cent of the valid time of minutes, or of longer intervals, whose middle third is 15 dB above both beside it. */
function tonalShare(all: readonly StoredInterval[], { startSec, endSec }: LimitWindow): number | null {
  const within = partsWithin(all, startSec, endSec);
  const blockSec = Math.max(60, ...within.map(({ durationSec }) => durationSec));
  let [tonalSec, validSec] = [0, 0];
  for (let fromSec = startSec; fromSec < endSec; fromSec += blockSec) {
    const parts = partsWithin(all, fromSec, Math.min(endSec, fromSec + blockSec)).filter(isCounted);
    const [below, level, above] = [0, 1, 2].map((at) => {
      const told = parts.filter(({ levelsCentiDb }) => (levelsCentiDb[at] ?? NONE) !== NONE);
      const energy = told.reduce((sum, one) => sum + one.sec * energyOf(one.levelsCentiDb[at] ?? NONE), 0);
      return told.length === 0 ? null : Math.floor(100 * Math.log10(energy / secondsOf(told)) + 0.5);
    });
    validSec += secondsOf(parts);
    const isTonal =
      typeof below === 'number' &&
      typeof level === 'number' &&
      typeof above === 'number' &&
      level - Math.max(below, above) >= 150;
    if (isTonal) tonalSec += secondsOf(parts);
  }
  return validSec === 0 ? null : (100 * tonalSec) / validSec;
}

interface Series {
  intervals: StoredInterval[];
  windows: LimitWindow[];
  judgement: Judgement;
  fromSec: number;
  toSec: number;
}

const seriesOf = (made: typeof stretches, tiling: typeof lengths) =>
  fc.tuple(fc.constantFrom(...AROUND), tiling, made).map(([[zone, day], length, sent]): Series => {
    const fromSec = Date.parse(`${day}T00:00:00Z`) / 1000 - 43_200;
    const toSec = fromSec + 2 * 86_400;
    const timeline = timelineOf(zone);
    return {
      intervals: intervalsOf(sent, fromSec - 1800),
      windows: windowsOf({ ...ALL_DAY, ...length }, fromSec, toSec, timeline),
      judgement: { validity: 'rules', timeline, exclusions: [] },
      fromSec,
      toSec,
    };
  });
/** Quantities of intervals have windows that follow one another. */
const fixed = seriesOf(
  stretches,
  lengths.filter(({ stepMin }) => stepMin === null),
);
/** A percentile level takes many samples of one length. */
const ofMinutes = seriesOf(stretchesOf([60], 120), lengths);

function isSame(found: number | null, expected: number | null): boolean {
  if (found === null || expected === null) return found === expected;
  return Math.abs(found - expected) < 1e-6;
}

/** Every window whose value is another than defined. */
function wrongOf(
  windows: readonly LimitWindow[],
  found: (window: LimitWindow) => number | null,
  expected: (window: LimitWindow) => number | null,
): object[] {
  return windows
    .map((window) => ({ window, found: found(window), expected: expected(window) }))
    .filter((one) => !isSame(one.found, one.expected));
}

const percents = fc.constantFrom(1, 10, 50, 90, 95);

test(
  'L_N and levels above a background of fixed and rolling windows are those of the definition',
  { timeout: 60_000 },
  () => {
    fc.assert(
      fc.property(ofMinutes, percents, ({ intervals, windows, judgement, fromSec, toSec }, percent) => {
        const isOfQuarters = windows.every(
          ({ startSec, endSec }) => startSec % 900 === 0 && endSec % 900 === 0,
        );
        const partSec = isOfQuarters ? 900 : 300;
        const parts = [];
        for (let startSec = fromSec - 86_400; startSec < toSec + 86_400; startSec += partSec) {
          const part = { fromSec: startSec, toSec: startSec + partSec };
          const { sums } = accumulate(intervals, part, judgement, { bandClasses: false });
          if (sums.validSec > 0) parts.push({ startSec, sums });
        }
        const counted = intervals.filter(isCounted);
        for (const [metric, defined] of [
          ['LAN', exceeded],
          ['LAeqLessLA90', aboveBackground],
        ] as const) {
          const rule: MetricRule = { metric, percent, ...NO_BAND };
          const sums = new WindowSums(parts, { parts: 'distributions', partSec });
          const wrong = wrongOf(
            windows,
            (window) => measure(rule, sums.of(window)).levelDb,
            ({ startSec, endSec }) => defined(partsWithin(counted, startSec, endSec), percent),
          );
          expect(wrong, metric).toEqual([]);
        }
      }),
      { numRuns: 25 },
    );
  },
);

interface EventCase {
  eventTenths: number;
  eventMinimumSec: number;
  eventGapSec: number;
}

const eventCases = fc.record({
  eventTenths: fc.integer({ min: 300, max: 900 }),
  eventMinimumSec: fc.constantFrom(1, 61, 300, 1000),
  eventGapSec: fc.constantFrom(0, 10, 60, 600),
});

test(
  'the number of events of fixed windows, and the LAE of the greatest, are those of the definition',
  { timeout: 60_000 },
  () => {
    fc.assert(
      fc.property(fixed, eventCases, ({ intervals, windows, judgement }, rule) => {
        const measured = (metric: 'eventCount' | 'eventLAE') => (window: LimitWindow) => {
          const span = { fromSec: window.startSec, toSec: window.endSec };
          return eventMeasureOf(partsWithin(intervals, span.fromSec, span.toSec), span, judgement, {
            metric,
            ...NO_BAND,
            ...rule,
          }).levelDb;
        };
        const isMeasured = ({ startSec, endSec }: LimitWindow) =>
          partsWithin(intervals, startSec, endSec).some(isCounted);
        const counts = wrongOf(windows, measured('eventCount'), (window) =>
          isMeasured(window) ? happenings(intervals, window, rule).length : null,
        );
        expect(counts, 'number').toEqual([]);
        const exposures = wrongOf(windows, measured('eventLAE'), (window) => {
          const levels = happenings(intervals, window, rule);
          return levels.length === 0 ? null : Math.max(...levels);
        });
        expect(exposures, 'LAE').toEqual([]);
      }),
      { numRuns: 50 },
    );
  },
);

test('the tonal share of fixed windows is that of the definition', { timeout: 60_000 }, () => {
  fc.assert(
    fc.property(fixed, ({ intervals, windows, judgement }) => {
      const wrong = wrongOf(
        windows,
        (window) => {
          const span = { fromSec: window.startSec, toSec: window.endSec };
          return tonalShareOf(partsWithin(intervals, span.fromSec, span.toSec), span, judgement).levelDb;
        },
        (window) => tonalShare(intervals, window),
      );
      expect(wrong).toEqual([]);
    }),
    { numRuns: 25 },
  );
});
