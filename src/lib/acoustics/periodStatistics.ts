import { countBandClasses, type BandInterval } from './bandClassCounting';
import { bandSlot, BAND_SLOTS, FIRST_BAND_INDEX, LAST_BAND_INDEX } from './bands';
import { energyOfCentiDb, levelOfEnergyDb } from './energy';
import { laeDb } from './exposure';
import { NO_LEVEL_CENTI_DB } from './levelRange';
import { octaveSlot, thirdsOfOctave } from './octaves';
import {
  emptyBandClasses,
  emptySums,
  mergeSums,
  noteBandFraction,
  noteExtremes,
  noteSampleSec,
  type PeriodSums,
} from './periodSums';

/** One interval as stored, clipped to the period by duration. Levels in hundredths of a dB. */
export interface AccumulatedInterval extends BandInterval {
  /** Whole seconds of the interval as the monitor made it, before clipping. */
  sampleSec: number;
  laeqCentiDb: number;
  lafmaxCentiDb: number | null;
  lafminCentiDb: number | null;
  lceqCentiDb: number | null;
  lcpeakCentiDb: number | null;
}

let lastBands: { indices: Int8Array; slots: number[] } = { indices: new Int8Array(0), slots: [] };

/** Gathers a period's intervals into sums that figures are taken from, and that merge with those of other periods. */
export class PeriodAccumulator {
  readonly sums: PeriodSums;

  /** `bandClasses` also counts the distribution of every band and octave; `from` goes on from stored sums. */
  constructor(options: { bandClasses?: boolean; from?: PeriodSums } = {}) {
    this.sums = options.from ?? emptySums({ bandClasses: options.bandClasses ?? false });
  }

  /**
   * Adds an interval; one that does not count (`isValid` false) adds its seconds to those excluded and nothing else.
   * @throws RangeError for a duration that is no positive whole number, or bands that do not match their levels.
   */
  add(interval: AccumulatedInterval, isValid: boolean): void {
    const { sums } = this;
    const { durationSec } = interval;
    if (!Number.isInteger(durationSec) || durationSec <= 0)
      throw new RangeError(`${durationSec} s is not a duration.`);
    if (!isValid) {
      sums.excludedSec += durationSec;
      return;
    }
    sums.validSec += durationSec;
    sums.aEnergySec += energyOfCentiDb(interval.laeqCentiDb) * durationSec;
    sums.aClasses.add(interval.laeqCentiDb, durationSec);
    if (interval.lceqCentiDb !== null) {
      sums.cEnergySec += energyOfCentiDb(interval.lceqCentiDb) * durationSec;
      sums.cValidSec += durationSec;
    }
    noteExtremes(sums, interval);
    noteSampleSec(sums, interval.sampleSec, false);
    this.#addBands(interval);
  }

  /** Adds another period's sums: in any order and grouping the result is that of the whole. */
  merge(other: { readonly sums: PeriodSums }): void {
    mergeSums(this.sums, other.sums);
  }

  /** Counts the distributions of every band and octave of the valid intervals whose energies are in the sums, all of them at once. */
  countBandClasses(intervals: readonly BandInterval[]): void {
    this.sums.bandClasses = emptyBandClasses();
    if (!this.sums.isBandFractionMixed) countBandClasses(intervals, this.sums.bandClasses);
  }

  /** LAeq in dB over the valid seconds; null when there are none. */
  laeqDb(): number | null {
    return meanDb(this.sums.aEnergySec, this.sums.validSec);
  }

  /** LCeq in dB over the valid seconds that have one; null when none has. */
  lceqDb(): number | null {
    return meanDb(this.sums.cEnergySec, this.sums.cValidSec);
  }

  /** LAE in dB: the exposure of the valid seconds, re 1 s. */
  laeDb(): number | null {
    return laeDb(this.laeqDb(), this.sums.validSec);
  }

  /** LAeq of base samples exceeded `percent` % of the valid time, in dB; null where there is no such level. */
  exceedanceLevelDb(percent: number): number | null {
    return this.sums.aClasses.exceedanceLevelDb(percent, this.sums.sampleSec);
  }

  /** Leq in dB of a band over its own valid seconds; null when there are none. */
  bandLeqDb(bandIndex: number): number | null {
    const slot = bandSlot(bandIndex);
    return meanDb(this.sums.bandEnergySec[slot] ?? 0, this.sums.bandValidSec[slot] ?? 0);
  }

  /** Leq in dB of an octave: the station's own, or the sum of its three thirds; null when one of them has no level. */
  octaveLeqDb(octaveIndex: number): number | null {
    if (this.sums.bandFraction === 1) return this.bandLeqDb(octaveIndex);
    let energy = 0;
    for (const third of thirdsOfOctave(octaveIndex)) {
      const slot = bandSlot(third);
      const validSec = this.sums.bandValidSec[slot] ?? 0;
      if (validSec === 0) return null;
      energy += (this.sums.bandEnergySec[slot] ?? 0) / validSec;
    }
    return levelOfEnergyDb(energy);
  }

  /** Level in dB that a band's own samples exceed `percent` % of the time; null where there is no such level. */
  bandExceedanceLevelDb(bandIndex: number, percent: number): number | null {
    const counts = this.sums.bandClasses?.bands[bandSlot(bandIndex)];
    return counts?.exceedanceLevelDb(percent, this.sums.sampleSec) ?? null;
  }

  /** The same for an octave, whose samples are the sums of each interval's thirds (never the sum of the thirds' L_N). */
  octaveExceedanceLevelDb(octaveIndex: number, percent: number): number | null {
    if (this.sums.bandFraction === 1) return this.bandExceedanceLevelDb(octaveIndex, percent);
    const counts = this.sums.bandClasses?.octaves[octaveSlot(octaveIndex)];
    return counts?.exceedanceLevelDb(percent, this.sums.sampleSec) ?? null;
  }

  #addBands(interval: AccumulatedInterval): void {
    const { levelsCentiDb, bandIndices, durationSec, bandFraction } = interval;
    if (levelsCentiDb.length !== bandIndices.length) {
      throw new RangeError(`${levelsCentiDb.length} levels for ${bandIndices.length} bands.`);
    }
    if (bandIndices.length === 0 || !noteBandFraction(this.sums, bandFraction, false)) return;
    const { bandEnergySec, bandValidSec } = this.sums;
    const slots = slotsOf(bandIndices);
    for (let i = 0; i < levelsCentiDb.length; i += 1) {
      const centiDb = levelsCentiDb[i] ?? NO_LEVEL_CENTI_DB;
      if (centiDb === NO_LEVEL_CENTI_DB) continue;
      const slot = slots[i] ?? NaN;
      bandEnergySec[slot] = (bandEnergySec[slot] ?? 0) + energyOfCentiDb(centiDb) * durationSec;
      bandValidSec[slot] = (bandValidSec[slot] ?? 0) + durationSec;
    }
    if (this.sums.bandClasses) countBandClasses([interval], this.sums.bandClasses);
  }
}

/** Slots of some bands; intervals of one band set share one array of indices, so this is worked out once for them. */
function slotsOf(indices: Int8Array): number[] {
  if (lastBands.indices !== indices) lastBands = { indices, slots: Array.from(indices, slotOf) };
  return lastBands.slots;
}

function slotOf(bandIndex: number): number {
  const slot = bandSlot(bandIndex);
  if (!(slot >= 0 && slot < BAND_SLOTS)) {
    throw new RangeError(`${bandIndex} is not a band index from ${FIRST_BAND_INDEX} to ${LAST_BAND_INDEX}.`);
  }
  return slot;
}

function meanDb(energySec: number, sec: number): number | null {
  return sec === 0 ? null : levelOfEnergyDb(energySec / sec);
}
