import { expect, test } from 'vitest';
import { BAND_SLOTS } from '#lib/acoustics/bands';
import {
  DayTraceBuilder,
  DAY_MINUTES,
  packShapes,
  unpackShapes,
  type DayTrace,
} from '#lib/acoustics/dayTrace';
import { spectralLikeness } from '#lib/acoustics/likeness';
import { ShapeSearch } from '#lib/acoustics/shapeSearch';

/** A day of invented thirds 25 Hz to 10 kHz, some of them missing, repeatable. */
const FIRST_SLOT = 3;
const THIRDS = 27;
const SLOTS = Array.from({ length: THIRDS }, (_, at) => FIRST_SLOT + at);

function noiseOf(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1_103_515_245 + 12_345) % 2_147_483_648;
    return state / 2_147_483_648;
  };
}

function inventDay(seed: number): { levels: Int16Array[]; trace: DayTrace } {
  const noise = noiseOf(seed);
  const builder = new DayTraceBuilder();
  const levels = Array.from({ length: DAY_MINUTES }, (_, minute) => {
    const tilt = noise() * 2 - 1;
    const loudness = 4000 + noise() * 3000;
    const shape = Int16Array.from(SLOTS, (slot) =>
      noise() < 0.01 ? -32768 : Math.round(loudness + tilt * slot * 60 + noise() * 500),
    );
    const interval = {
      laeqCentiDb: Math.round(loudness),
      bandFraction: 3,
      slots: SLOTS,
      levelsCentiDb: shape,
    };
    builder.add(interval, minute * 60, minute * 60 + 60);
    return shape;
  });
  const trace = builder.trace();
  if (!trace) throw new Error('A day that was measured has a trace.');
  return { levels, trace };
}

function bySlot(levels: Int16Array): (number | null)[] {
  return Array.from({ length: BAND_SLOTS }, (_, slot) => {
    const centiDb = levels[slot - FIRST_SLOT] ?? -32768;
    return centiDb === -32768 ? null : centiDb / 100;
  });
}

test('finds what brute force over the definition finds, within the quarter decibel that the trace rounds to', () => {
  const { levels, trace } = inventDay(7);
  const stored = unpackShapes(packShapes(trace), trace.outline);
  for (const of of [0, 500, 1200]) {
    const asked = bySlot(levels[of] ?? new Int16Array());
    for (const mostRmsDb of [1.5, 2.5, 4]) {
      const search = new ShapeSearch({ levelsDb: asked, laeqDb: 50, mostRmsDb, withinDb: null });
      const found = new Map(search.matches(stored, () => true).map((match) => [match.minute, match.rmsDb]));
      levels.forEach((minuteLevels, minute) => {
        const rmsDb = spectralLikeness(asked, bySlot(minuteLevels))?.rmsDb ?? Infinity;
        if (rmsDb <= mostRmsDb - 0.25) expect(found.has(minute)).toBe(true);
        if (found.has(minute)) expect(Math.abs((found.get(minute) ?? NaN) - rmsDb)).toBeLessThanOrEqual(0.25);
      });
      expect(found.size).toBeGreaterThan(0);
    }
  }
});

test('the outline never rules out a minute that is alike, and rules out what is far', () => {
  const { levels, trace } = inventDay(11);
  let ruledOut = 0;
  for (let minute = 0; minute < DAY_MINUTES; minute += 7) {
    const asked = bySlot(levels[(minute * 13) % DAY_MINUTES] ?? new Int16Array());
    const search = new ShapeSearch({ levelsDb: asked, laeqDb: null, mostRmsDb: 1.2, withinDb: null });
    const alone = { ...trace, outline: trace.outline.slice(minute * 7, minute * 7 + 7) };
    const isAlike = search.matches(trace, (other) => other === minute).length > 0;
    const mayBe = search.mayMatch(alone.outline);
    if (isAlike) expect(mayBe).toBe(true);
    if (!mayBe) ruledOut += 1;
  }
  expect(ruledOut).toBeGreaterThan(50);
});

test('seconds are averaged by energy to minutes; half a minute is needed; octaves have a level but no shape', () => {
  const builder = new DayTraceBuilder();
  const levels = Int16Array.from(SLOTS, () => 5000);
  const louder = Int16Array.from(SLOTS, (_, at) => (at < 13 ? 6000 : 5000));
  for (let sec = 0; sec < 60; sec += 1) {
    const levelsCentiDb = sec % 2 ? louder : levels;
    builder.add(
      { laeqCentiDb: sec % 2 ? 6000 : 5000, bandFraction: 3, slots: SLOTS, levelsCentiDb },
      sec,
      sec + 1,
    );
  }
  builder.add({ laeqCentiDb: 7000, bandFraction: 3, slots: SLOTS, levelsCentiDb: levels }, 60, 89);
  builder.add(
    { laeqCentiDb: 4000, bandFraction: 1, slots: [4], levelsCentiDb: Int16Array.of(5000) },
    120,
    180,
  );
  const trace = builder.trace();
  expect(trace?.laeqCentiDb.slice(0, 3)).toEqual(Int16Array.of(5740, -32768, 4000));
  const steps = trace?.steps.slice(0, THIRDS) ?? new Uint8Array();
  // 7.4 dB apart, in half decibels.
  expect((steps[0] ?? 0) - (steps[THIRDS - 1] ?? 0)).toBe(15);
  expect(trace?.outline[14]).toBe(0);
});
