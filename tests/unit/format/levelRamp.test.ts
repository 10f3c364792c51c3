import { describe, expect, it } from 'vitest';
import { levelColour, levelRampRgb, RAMP_STEPS } from '#lib/format/levelRamp';
import { lightnessOf } from '#lib/format/oklch';

function lightnesses(theme: 'light' | 'dark'): number[] {
  const ramp = levelRampRgb(theme);
  return Array.from({ length: RAMP_STEPS }, (_, step) =>
    lightnessOf([...ramp.subarray(step * 4, step * 4 + 3)]),
  );
}

describe('the level ramp', () => {
  it('loses lightness at every step on paper, gains it at every step in the dark', () => {
    const [light, dark] = [lightnesses('light'), lightnesses('dark')];
    for (let step = 1; step < RAMP_STEPS; step += 1) {
      expect(light[step]).toBeLessThan(light[step - 1] ?? NaN);
      expect(dark[step]).toBeGreaterThan(dark[step - 1] ?? NaN);
    }
  });

  it('has opaque steps from the first stop to the last', () => {
    const light = levelRampRgb('light');
    expect(light).toHaveLength(1024);
    expect(light.filter((_, at) => at % 4 === 3).every((alpha) => alpha === 255)).toBe(true);
    expect(lightnesses('light')[0]).toBeCloseTo(0.975, 2);
    expect(lightnesses('light').at(-1)).toBeCloseTo(0.27, 2);
  });

  it('gives levels beyond its range the colours of its ends', () => {
    const range = { lowDb: 30, highDb: 80 };
    expect(levelColour(10, range, 'dark')).toBe(levelColour(30, range, 'dark'));
    expect(levelColour(99, range, 'dark')).toBe(levelColour(80, range, 'dark'));
    expect(levelColour(30, range, 'dark')).not.toBe(levelColour(80, range, 'dark'));
  });
});
