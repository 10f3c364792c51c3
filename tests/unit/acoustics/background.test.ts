import { expect, test } from 'vitest';
import { subtractBackgroundDb } from '#lib/acoustics/background';

test('a margin of 3 dB is refused however binary arithmetic writes it', () => {
  for (let tenths = 300; tenths < 900; tenths += 1) {
    expect(subtractBackgroundDb((tenths + 30) / 10, tenths / 10).kind).toBe('refused');
    expect(subtractBackgroundDb((tenths + 31) / 10, tenths / 10).kind).toBe('corrected');
  }
});

test('a residual above the measured level is refused without a figure', () => {
  expect(subtractBackgroundDb(50, 50.1)).toEqual({
    kind: 'refused',
    reason: 'not-below',
    upperBoundDb: 50,
    informativeDb: null,
  });
});
