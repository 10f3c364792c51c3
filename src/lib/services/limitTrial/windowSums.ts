import { BAND_SLOTS } from '#lib/acoustics/bands';
import { emptySums, mergeSums, noteBandFraction } from '#lib/acoustics/periodSums';
import type { LimitWindow } from '#lib/services/limits/windows';
import type { MeasurableSums } from '#lib/services/limits/measure';
import type { TrialParts } from './parts';
import type { TrialQuarter } from './trialQuarters';

const NOTHING: MeasurableSums = emptySums({ bandClasses: false });

/** Sums of windows from parts of equal length, both ascending; asked for in order of time. */
export class WindowSums {
  #next = 0;
  readonly #bands = emptySums({ bandClasses: false });

  constructor(
    private readonly parts: readonly TrialQuarter[],
    private readonly what: { parts: TrialParts; partSec: number },
  ) {}

  /** Sums of one window, that begins no earlier than the one before, as far as they were read: until the next one is asked for. */
  of({ startSec, endSec }: LimitWindow): MeasurableSums {
    while ((this.parts[this.#next]?.startSec ?? Infinity) < startSec) this.#next += 1;
    let end = this.#next;
    while ((this.parts[end]?.startSec ?? Infinity) + this.what.partSec <= endSec) end += 1;
    // Most windows of a year are single quarter-hours: these are taken as they are.
    if (end - this.#next <= 1) return (end > this.#next && this.parts[this.#next]?.sums) || NOTHING;
    switch (this.what.parts) {
      case 'energies':
        return this.added(this.#next, end);
      case 'bands':
        return this.addedBands(this.#next, end);
      case 'distributions':
        return this.merged(this.#next, end);
    }
  }

  /** What A-weighted limits look at, without merging the rest: rolling windows of a year are millions of parts. */
  private added(from: number, to: number): MeasurableSums {
    const whole = { ...NOTHING };
    for (let at = from; at < to; at += 1) {
      const sums = this.parts[at]?.sums;
      if (!sums) continue;
      whole.validSec += sums.validSec;
      whole.aEnergySec += sums.aEnergySec;
      if (sums.lafmaxCentiDb !== null && sums.lafmaxCentiDb > (whole.lafmaxCentiDb ?? -Infinity))
        whole.lafmaxCentiDb = sums.lafmaxCentiDb;
    }
    return whole;
  }

  /** What limits on bands look at, in one room that each window takes over from the one before. */
  private addedBands(from: number, to: number): MeasurableSums {
    const whole = this.#bands;
    whole.validSec = 0;
    whole.bandFraction = null;
    whole.isBandFractionMixed = false;
    whole.bandEnergySec.fill(0);
    whole.bandValidSec.fill(0);
    for (let at = from; at < to; at += 1) {
      const sums = this.parts[at]?.sums;
      if (!sums) continue;
      whole.validSec += sums.validSec;
      if (!noteBandFraction(whole, sums.bandFraction, sums.isBandFractionMixed)) continue;
      for (let slot = 0; slot < BAND_SLOTS; slot += 1) {
        whole.bandEnergySec[slot] = (whole.bandEnergySec[slot] ?? 0) + (sums.bandEnergySec[slot] ?? 0);
        whole.bandValidSec[slot] = (whole.bandValidSec[slot] ?? 0) + (sums.bandValidSec[slot] ?? 0);
      }
    }
    return whole;
  }

  /** As `mergeSums` has it, without what limits do not look at. */
  private merged(from: number, to: number): MeasurableSums {
    const whole = emptySums({ bandClasses: false });
    for (const { sums } of this.parts.slice(from, to)) mergeSums(whole, { ...REST, ...sums });
    return whole;
  }
}

/** Distributions and C-weighted sums of nothing: merging them changes nothing. */
const REST = emptySums({ bandClasses: false });
