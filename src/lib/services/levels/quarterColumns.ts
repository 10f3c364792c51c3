import { type QuarterHour } from '#db/queries/quarterHours';
import { bandSlot, BAND_SLOTS, type BandFraction } from '#lib/acoustics/bands';
import { addAt, lowerAt, raiseAt, setBitsAt, type Columns } from './columns';
import { meanCentiDb } from './intervalColumns';

/** Fills the columns that some quarter-hours (ascending) fall in: energy means of what counts; nothing else is kept in them. */
export function fillFromQuarters(columns: Columns, quarters: readonly QuarterHour[]): void {
  const { plan } = columns;
  const energies = new ColumnEnergies();
  let at = -1;
  for (const quarter of quarters) {
    const column = Math.floor((quarter.startSec - plan.fromSec) / plan.stepSec);
    if (column !== at) {
      if (at >= 0) energies.fill(columns, at);
      at = column;
      energies.clear();
    }
    energies.add(quarter);
    const { validSec, excludedSec, lafmaxCentiDb, lafminCentiDb } = quarter.sums;
    addAt(columns.presentSec, at, validSec + excludedSec);
    addAt(columns.validSec, at, validSec);
    addAt(columns.lateSec, at, quarter.lateSec);
    setBitsAt(columns.flagBits, at, quarter.flagBits);
    setBitsAt(columns.reasonBits, at, quarter.reasonBits);
    raiseAt(columns.lafmaxCentiDb, at, lafmaxCentiDb);
    lowerAt(columns.lafminCentiDb, at, lafminCentiDb);
  }
  if (at >= 0) energies.fill(columns, at);
}

/** Energies of one column: whole sums of quarter-hours hold distributions as well, which take most of the time of adding them up. */
class ColumnEnergies {
  #validSec = 0;
  #aEnergySec = 0;
  #fraction: BandFraction | null = null;
  /** Octaves and thirds both occurred: there are no band figures. */
  #isMixed = false;
  readonly #bandSec = new Float64Array(BAND_SLOTS);
  readonly #bandEnergySec = new Float64Array(BAND_SLOTS);

  clear(): void {
    this.#validSec = 0;
    this.#aEnergySec = 0;
    this.#fraction = null;
    this.#isMixed = false;
    this.#bandSec.fill(0);
    this.#bandEnergySec.fill(0);
  }

  add({ sums }: QuarterHour): void {
    this.#validSec += sums.validSec;
    this.#aEnergySec += sums.aEnergySec;
    const { bandFraction, bandValidSec, bandEnergySec } = sums;
    this.#isMixed ||=
      sums.isBandFractionMixed ||
      (bandFraction !== null && this.#fraction !== null && bandFraction !== this.#fraction);
    this.#fraction ??= bandFraction;
    for (let slot = 0; slot < BAND_SLOTS; slot += 1) {
      this.#bandSec[slot] = (this.#bandSec[slot] ?? 0) + (bandValidSec[slot] ?? 0);
      this.#bandEnergySec[slot] = (this.#bandEnergySec[slot] ?? 0) + (bandEnergySec[slot] ?? 0);
    }
  }

  fill(columns: Columns, at: number): void {
    const { bands, levelsCentiDb } = columns;
    columns.laeqCentiDb[at] = meanCentiDb(this.#aEnergySec, this.#validSec);
    if (this.#isMixed || this.#fraction !== bands[0]?.fraction) return;
    bands.forEach(({ index }, place) => {
      const slot = bandSlot(index);
      levelsCentiDb[at * bands.length + place] = meanCentiDb(
        this.#bandEnergySec[slot] ?? 0,
        this.#bandSec[slot] ?? 0,
      );
    });
  }
}
