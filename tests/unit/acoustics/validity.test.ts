import { describe, expect, test } from 'vitest';
import {
  FLAG_NAMES,
  FLAGS,
  flagMask,
  flagNames,
  INVALIDITY_REASONS,
  invalidityReasons,
  isFlagName,
  isValid,
} from '#lib/acoustics/validity';

const rules = { maximumWindSpeedMs: 5, excludeRain: false };

describe('flags', () => {
  test('nine flags of the contract, bits that never change', () => {
    expect(FLAG_NAMES).toEqual([
      'overload',
      'underrange',
      'calibration',
      'selfcheck',
      'rain',
      'wind',
      'tamper',
      'powerloss',
      'clockset',
    ]);
    expect(FLAG_NAMES.map((name) => FLAGS[name])).toEqual([1, 2, 4, 8, 16, 32, 64, 128, 256]);
    expect(FLAGS.laeqComputed).toBe(0x8000);
  });

  test('names and masks, there and back; what Bittern sets itself is not shown', () => {
    expect(flagNames(flagMask(['wind', 'overload']) | FLAGS.laeqComputed)).toEqual(['overload', 'wind']);
    expect(flagMask([])).toBe(0);
    expect(isFlagName('rain')).toBe(true);
    expect(isFlagName('laeqComputed')).toBe(false);
    expect(isFlagName('toString')).toBe(false);
  });
});

describe('validity', () => {
  test.each(['calibration', 'selfcheck', 'overload', 'tamper', 'powerloss', 'clockset', 'wind'] as const)(
    'flagged %s: out',
    (name) => {
      const interval = { flags: FLAGS[name], windSpeedMs: null };
      expect(invalidityReasons(interval, rules, false)).toEqual([name]);
      expect(isValid(interval, rules, false)).toBe(false);
    },
  );

  test('under range, and a computed LAeq, stay in', () => {
    const interval = { flags: FLAGS.underrange | FLAGS.laeqComputed, windSpeedMs: 5 };
    expect(invalidityReasons(interval, rules, false)).toEqual([]);
    expect(isValid(interval, rules, false)).toBe(true);
  });

  test('wind: above the bound, not at it; unknown is not above', () => {
    const at = (windSpeedMs: number | null) => invalidityReasons({ flags: 0, windSpeedMs }, rules, false);
    expect(at(5)).toEqual([]);
    expect(at(5.01)).toEqual(['wind-speed']);
    expect(at(null)).toEqual([]);
  });

  test('rain: out only where the network says so', () => {
    const interval = { flags: FLAGS.rain, windSpeedMs: 0 };
    expect(isValid(interval, rules, false)).toBe(true);
    expect(invalidityReasons(interval, { ...rules, excludeRain: true }, false)).toEqual(['rain']);
  });

  test('every reason at once, in fixed order; its own sensor speaks before a mast', () => {
    const interval = { flags: 0x1ff, windSpeedMs: 20 };
    expect(invalidityReasons(interval, { ...rules, excludeRain: true }, true)).toEqual([
      ...INVALIDITY_REASONS.filter((reason) => !reason.startsWith('mast-')),
    ]);
  });

  test('the fast path answers as the reasons do, for every mask', () => {
    for (let flags = 0; flags < 0x200; flags += 1) {
      for (const windSpeedMs of [null, 5, 6]) {
        for (const excludeRain of [false, true]) {
          for (const excluded of [false, true]) {
            const [interval, own] = [
              { flags, windSpeedMs },
              { ...rules, excludeRain },
            ];
            const hasNone = invalidityReasons(interval, own, excluded).length === 0;
            if (isValid(interval, own, excluded) !== hasNone)
              expect.fail(JSON.stringify({ interval, own, excluded }));
          }
        }
      }
    }
  });
});
