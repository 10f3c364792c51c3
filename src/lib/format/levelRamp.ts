import { lightnessOf, rgbBytesOf, type Oklch } from './oklch';

export type Theme = 'light' | 'dark';

type Stop = readonly [lightness: number, chroma: number, hueDeg: number];

/**
 * Bittern's level ramp, quiet to loud, evenly spaced. A quiet level recedes into the paper, a loud one gains ink (or light):
 * lightness alone tells the order. Hue −15° is 345°, named so that it goes on from 22° the short way.
 */
const STOPS: Record<Theme, readonly Stop[]> = {
  light: [
    [0.975, 0.012, 95],
    [0.9, 0.055, 105],
    [0.81, 0.105, 95],
    [0.7, 0.135, 70],
    [0.56, 0.15, 42],
    [0.42, 0.135, 22],
    [0.27, 0.07, -15],
  ],
  dark: [
    [0.22, 0.02, 155],
    [0.34, 0.05, 160],
    [0.46, 0.09, 150],
    [0.6, 0.11, 125],
    [0.74, 0.13, 95],
    [0.86, 0.12, 88],
    [0.96, 0.05, 95],
  ],
};

/** Steps of the ramp. */
export const RAMP_STEPS = 256;

const made = new Map<Theme, Uint8ClampedArray>();

/** The ramp as 256 opaque RGBA quadruples, quiet to loud, as an ImageData takes them. Shared: do not write to it. */
export function levelRampRgb(theme: Theme): Uint8ClampedArray {
  const ramp = made.get(theme) ?? makeRamp(STOPS[theme]);
  made.set(theme, ramp);
  return ramp;
}

/** CSS colour of a level in dB on a ramp that spans `range`; levels beyond it take the end's colour. */
export function levelColour(levelDb: number, range: { lowDb: number; highDb: number }, theme: Theme): string {
  const share = (levelDb - range.lowDb) / (range.highDb - range.lowDb);
  const step = Math.round(Math.min(1, Math.max(0, share)) * (RAMP_STEPS - 1));
  const [red, green, blue] = levelRampRgb(theme).subarray(step * 4, step * 4 + 3);
  return `rgb(${red} ${green} ${blue})`;
}

function makeRamp(stops: readonly Stop[]): Uint8ClampedArray {
  const ramp = new Uint8ClampedArray(RAMP_STEPS * 4);
  const direction = (stops.at(-1)?.[0] ?? 0) > (stops[0]?.[0] ?? 0) ? 1 : -1;
  let previous = -direction * Infinity;
  for (let step = 0; step < RAMP_STEPS; step += 1) {
    const rgb = rgbBytesOf(colourAt(stops, step / (RAMP_STEPS - 1)));
    // Rounding to bytes can stall the lightness for a step; green moves it most.
    while (direction * (lightnessOf(rgb) - previous) <= 0) rgb[1] += direction;
    ramp.set([...rgb, 255], step * 4);
    previous = lightnessOf(rgb);
  }
  return ramp;
}

function colourAt(stops: readonly Stop[], share: number): Oklch {
  const place = share * (stops.length - 1);
  const at = Math.min(Math.floor(place), stops.length - 2);
  const [from, to] = [stops[at], stops[at + 1]];
  if (!from || !to) throw new RangeError('A ramp needs two stops.');
  const between = (part: 0 | 1 | 2) => from[part] + (to[part] - from[part]) * (place - at);
  return { lightness: between(0), chroma: between(1), hueDeg: between(2) };
}
