import { energyOfCentiDb, levelOfEnergyDb } from './energy';
import { NO_LEVEL_CENTI_DB } from './levelRange';
import { toCentiDb } from './rounding';

/** An interval's stored band levels; all of one call have the same bands. */
export interface SpectrumInterval {
  startSec: number;
  durationSec: number;
  levelsCentiDb: Int16Array;
}

/**
 * Averages consecutive intervals (energy, by duration) into blocks of at least `minimumSec`, as the tonal survey method
 * wants at least 60 s. An interval that is long enough stays alone. A gap ends the block before it; one that ends
 * short of `minimumSec` is left out, because it cannot be assessed. A band that is missing in a part is missing in its block.
 */
export function spectrumBlocks(
  intervals: readonly SpectrumInterval[],
  minimumSec: number,
): SpectrumInterval[] {
  const blocks: SpectrumInterval[] = [];
  let parts: SpectrumInterval[] = [];
  let heldSec = 0;
  for (const interval of intervals) {
    const last = parts.at(-1);
    if (last && last.startSec + last.durationSec !== interval.startSec) {
      parts = [];
      heldSec = 0;
    }
    parts.push(interval);
    heldSec += interval.durationSec;
    if (heldSec >= minimumSec) {
      blocks.push(meanOf(parts, heldSec));
      parts = [];
      heldSec = 0;
    }
  }
  return blocks;
}

function meanOf(parts: readonly SpectrumInterval[], heldSec: number): SpectrumInterval {
  const [first] = parts;
  if (!first) throw new RangeError('A block of no intervals has no mean.');
  if (parts.length === 1) return first;
  const levelsCentiDb = first.levelsCentiDb.map((_, band) => meanOfBandCentiDb(parts, heldSec, band));
  return { startSec: first.startSec, durationSec: heldSec, levelsCentiDb };
}

function meanOfBandCentiDb(parts: readonly SpectrumInterval[], heldSec: number, band: number): number {
  let energySec = 0;
  for (const { levelsCentiDb, durationSec } of parts) {
    const centiDb = levelsCentiDb[band] ?? NO_LEVEL_CENTI_DB;
    if (centiDb === NO_LEVEL_CENTI_DB) return NO_LEVEL_CENTI_DB;
    energySec += energyOfCentiDb(centiDb) * durationSec;
  }
  return toCentiDb(levelOfEnergyDb(energySec / heldSec) ?? NaN);
}
