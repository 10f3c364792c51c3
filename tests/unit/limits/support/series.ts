import fc from 'fast-check';
import type { StoredInterval } from '#db/queries/intervals';
import type { NetworkSettings } from '#db/queries/networks';
import { FLAGS } from '#lib/acoustics/validity';
import { FIXED_LENGTHS_MIN } from '#lib/contracts/limitWindows';
import type { WindowRule } from '#lib/services/limits/windows';

/** What a monitor may have sent about a clock change, and limits' windows of it. */
export const WINDY_MS = 5;
export const BAND_INDEX = -10;
export const AROUND: [zone: string, day: string][] = [
  ['Europe/London', '2026-03-29'],
  ['Europe/London', '2026-10-25'],
  ['Australia/Lord_Howe', '2026-04-05'],
  ['Asia/Kathmandu', '2026-06-10'],
];
export const ALL_DAY: WindowRule = {
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
/** Rolling windows of any length, or fixed ones of those that tile the day. */
export const lengths = fc.oneof(
  fc
    .tuple(fc.integer({ min: 2, max: 36 }), fc.constantFrom(5, 15))
    .filter(([fives, stepMin]) => fives * 5 > stepMin)
    .map(([fives, stepMin]) => ({ windowMin: fives * 5, stepMin })),
  fc.constantFrom(...FIXED_LENGTHS_MIN).map((windowMin) => ({ windowMin, stepMin: null })),
);

/** Stretches of a monitor: silence, then intervals of one length of these at levels of their own, at most so many. */
export const stretchesOf = (durationsSec: readonly number[], mostLevels: number) =>
  fc.array(
    fc.record({
      gapSec: fc.constantFrom(0, 0, 1, 60, 299, 3000, 20_000),
      durationSec: fc.constantFrom(...durationsSec),
      levels: fc.array(
        fc.record({
          laeqCentiDb: fc.integer({ min: 2000, max: 9500 }),
          aboveCentiDb: fc.option(fc.integer({ min: 0, max: 2500 })),
          lceqCentiDb: fc.option(fc.integer({ min: 2000, max: 9900 })),
          bandCentiDb: fc.option(fc.integer({ min: 0, max: 9000 })),
          besideCentiDb: fc.option(fc.integer({ min: 1000, max: 6000 })),
          windSpeedMs: fc.constantFrom(null, 2, 5, 5.01),
          flags: fc.constantFrom(0, 0, 0, FLAGS.overload),
        }),
        { maxLength: mostLevels },
      ),
    }),
    { maxLength: 12 },
  );

export const stretches = stretchesOf([60, 300, 420, 900, 3600], 30);

export type Stretch = typeof stretches extends fc.Arbitrary<infer S> ? S : never;

/** The intervals of some stretches, the first of which begins at an instant. */
export function intervalsOf(made: Stretch, fromSec: number): StoredInterval[] {
  const intervals: StoredInterval[] = [];
  let startSec = fromSec;
  for (const { gapSec, durationSec, levels } of made) {
    startSec += gapSec;
    for (const { aboveCentiDb, bandCentiDb, besideCentiDb, laeqCentiDb, ...rest } of levels) {
      intervals.push({
        ...NOTHING_ELSE,
        ...rest,
        startSec,
        durationSec,
        laeqCentiDb,
        lafmaxCentiDb: aboveCentiDb === null ? null : laeqCentiDb + aboveCentiDb,
        bandIndices: BANDS,
        levelsCentiDb: Int16Array.of(besideCentiDb ?? NONE, bandCentiDb ?? NONE, besideCentiDb ?? NONE),
      });
      startSec += durationSec;
    }
  }
  return intervals;
}

const NONE = -32768;
const BANDS = Int8Array.of(BAND_INDEX - 1, BAND_INDEX, BAND_INDEX + 1);
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

/** Settings of a network in a zone, from ever. */
export function timelineOf(timeZone: string): NetworkSettings[] {
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
