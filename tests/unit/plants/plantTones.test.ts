import { describe, expect, test } from 'vitest';
import { bandHolding } from '#lib/acoustics/bands';
import { byStrength, matchPlant } from '#lib/acoustics/plantMatches';
import { plantLines, type Machine } from '#lib/acoustics/plantTones';
import { lineFormula, scheduleWords } from '#lib/format/plants';
import { clocksOf, scheduledShare } from '#lib/services/plants/schedule';

const NOTHING: Machine = {
  minRpm: null,
  maxRpm: null,
  blades: null,
  poles: null,
  cylinders: null,
  strokes: null,
  mainsHz: null,
  toneHz: null,
};
const fan: Machine = { ...NOTHING, minRpm: 1500, maxRpm: 1500, blades: 4 };
const transformer: Machine = { ...NOTHING, mainsHz: 50 };
const third = (hz: number) => bandHolding(3, hz) ?? { lowerHz: 0, upperHz: 0 };
const rangeAt = (hz: number) => ({ fromHz: third(hz).lowerHz, toHz: third(hz).upperHz });

/** Fundamentals worked by hand from the usual formulas. */
const FUNDAMENTALS: [string, Machine, string, number, number][] = [
  ['a fan of 4 blades at 1500 rpm', fan, 'blade-pass', 100, 100],
  ['its shaft', fan, 'shaft', 25, 25],
  ['a transformer on 50 Hz', transformer, 'mains', 100, 100],
  [
    'a four-stroke of 6 cylinders at 1500 rpm',
    { ...NOTHING, minRpm: 1500, maxRpm: 1500, cylinders: 6, strokes: 4 },
    'firing',
    75,
    75,
  ],
  [
    'a two-stroke of 6 cylinders at 120 rpm',
    { ...NOTHING, minRpm: 120, maxRpm: 120, cylinders: 6, strokes: 2 },
    'firing',
    12,
    12,
  ],
  ['a four-pole motor on 50 Hz with slip', { ...NOTHING, poles: 4, mainsHz: 50 }, 'shaft', 24, 25],
  ['a fan that varies', { ...fan, minRpm: 900 }, 'blade-pass', 60, 100],
];

test.each(FUNDAMENTALS)('%s', (_, machine, source, fromHz, toHz) => {
  const line = plantLines(machine).find((one) => one.source === source && one.harmonic === 1);
  expect(line?.fromHz).toBeCloseTo(fromHz, 9);
  expect(line?.toHz).toBeCloseTo(toHz, 9);
});

describe('matching', () => {
  test('lines count where they fall into a band, its upper edge excluded', () => {
    expect(matchPlant(fan, [rangeAt(100)])).toMatchObject({ source: 'blade-pass', rangeCount: 1, fit: 1 });
    expect(matchPlant(fan, [rangeAt(630)])).toBeNull();
    expect(matchPlant(fan, [])).toBeNull();
    expect(matchPlant({ ...NOTHING, toneHz: 200 }, [{ fromHz: 150, toHz: 200 }])).toBeNull();
    expect(matchPlant(NOTHING, [rangeAt(100)])).toBeNull();
  });

  test('more harmonics, the machine’s purpose and a known speed are more convincing', () => {
    const ranges = [rangeAt(100), rangeAt(200)];
    const strength = (machine: Machine, of = ranges) => {
      const match = matchPlant(machine, of);
      if (!match) throw new Error('It does not match.');
      return match;
    };
    expect(byStrength(strength(fan), strength({ ...NOTHING, toneHz: 100 }))).toBe(0);
    expect(byStrength(strength(fan), strength({ ...NOTHING, toneHz: 200 }))).toBeLessThan(0);
    const one = [rangeAt(100)];
    const shaft = { ...NOTHING, minRpm: 6000, maxRpm: 6000 };
    expect(byStrength(strength(fan, one), strength(shaft, one))).toBeLessThan(0);
    const varying = { ...fan, minRpm: 300, maxRpm: 3000 };
    expect(byStrength(strength(fan, one), strength(varying, one))).toBeLessThan(0);
  });

  test('formulas in words', () => {
    const words = (machine: Machine, source: string, harmonic: number) => {
      const line = plantLines(machine).find((one) => one.source === source && one.harmonic === harmonic);
      return line && lineFormula(machine, line);
    };
    expect(words(fan, 'blade-pass', 1)).toBe('25 Hz × 4 blades = 100 Hz');
    expect(words(fan, 'blade-pass', 2)).toBe('25 Hz × 4 blades × 2 = 200 Hz');
    expect(words(transformer, 'mains', 3)).toBe('2 × 50 Hz mains × 3 = 300 Hz');
    expect(words({ ...fan, minRpm: 1452 }, 'blade-pass', 1)).toBe('24.2–25 Hz × 4 blades = 96.8–100 Hz');
  });
});

describe('schedules', () => {
  const night = { weekdays: 0b11111, fromMin: 21 * 60, toMin: 6 * 60 };
  const share = (from: string, to: string) =>
    scheduledShare(
      night,
      clocksOf({ fromSec: Date.parse(from) / 1000, toSec: Date.parse(to) / 1000 }, 'Europe/London'),
    );

  test('a run across midnight belongs to the day on which it begins', () => {
    // 16 January 2026 is a Friday.
    expect(share('2026-01-16T22:00:00Z', '2026-01-17T05:00:00Z')).toBe(1);
    expect(share('2026-01-17T22:00:00Z', '2026-01-18T05:00:00Z')).toBe(0);
    expect(share('2026-01-18T22:00:00Z', '2026-01-19T05:00:00Z')).toBe(0);
    expect(share('2026-01-19T20:00:00Z', '2026-01-19T22:00:00Z')).toBe(0.5);
  });

  test('by the clock on the wall in summer', () => {
    expect(share('2026-07-14T20:00:00Z', '2026-07-14T21:00:00Z')).toBe(1);
    expect(share('2026-07-14T19:00:00Z', '2026-07-14T20:00:00Z')).toBe(0);
  });

  test('in words', () => {
    expect(scheduleWords(0b11111, { from: '21:00', to: '06:00' })).toBe('Mon–Fri 21:00–06:00');
    expect(scheduleWords(0b1111111, { from: null, to: null })).toBe('every day');
    expect(scheduleWords(0b0000101, { from: '07:00', to: '12:00' })).toBe('Mon, Wed 07:00–12:00');
  });
});
