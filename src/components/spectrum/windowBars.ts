import type { ComparedBand } from '#lib/contracts/exceedanceDetail';
import { barRange, barShare } from './spectrumScale';

/** A band of a window with what is usual, whose range may be unknown where its median is known. */
export type WindowBand = Pick<
  ComparedBand,
  'nominalHz' | 'Leq' | 'usual' | 'usualLow' | 'usualHigh' | 'isStandingOut'
>;

/** Sizes of the drawing in its own units. */
export const DRAWING = { width: 720, height: 250, left: 36, top: 8, foot: 222 } as const;

/** A band as it is drawn; heights are distances from the top. */
export interface DrawnBand {
  band: WindowBand;
  x: number;
  width: number;
  /** Top of the bar; null without a level. */
  barY: number | null;
  /** Usual median; null where it is not known. */
  usualY: number | null;
  /** Usual range; null where it is not known. */
  rangeY: { lowY: number; highY: number } | null;
}

/** The window's spectrum with the usual one on a common scale; null where no band has a level. */
export function drawSpectrum(
  bands: readonly WindowBand[],
): { bands: DrawnBand[]; ticks: { levelDb: number; y: number }[] } | null {
  if (bands.every(({ Leq }) => Leq === null)) return null;
  const range = barRange(
    bands.flatMap(({ Leq, usual, usualLow, usualHigh }) => [Leq, usual, usualLow, usualHigh]),
  );
  const { left, width, top, foot } = DRAWING;
  const y = (levelDb: number) => round(foot - (foot - top) * barShare(range, levelDb));
  const step = (width - left) / bands.length;
  const ticks: { levelDb: number; y: number }[] = [];
  const everyDb = range.topDb - range.footDb > 50 ? 20 : 10;
  for (let levelDb = range.footDb; levelDb <= range.topDb; levelDb += everyDb) {
    ticks.push({ levelDb, y: y(levelDb) });
  }
  return {
    ticks,
    bands: bands.map((band, at) => ({
      band,
      x: round(left + at * step + step * 0.1),
      width: round(step * 0.8),
      barY: band.Leq === null ? null : y(band.Leq),
      usualY: band.usual === null ? null : y(band.usual),
      rangeY:
        band.usualLow === null || band.usualHigh === null
          ? null
          : { lowY: y(band.usualLow), highY: y(band.usualHigh) },
    })),
  };
}

function round(value: number): number {
  return Math.round(value * 10) / 10;
}
