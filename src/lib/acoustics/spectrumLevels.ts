import { bandSlot, type Band, type BandFraction } from './bands';
import { levelOfEnergyDb } from './energy';
import { aWeightOfBandDb } from './weighting';

/** An unweighted spectrum: levels in dB beside bands (null = none), with the usual levels of the same bands if known. */
export interface LevelsOfBands {
  fraction: BandFraction;
  bands: readonly Pick<Band, 'index'>[];
  levelsDb: readonly (number | null)[];
  usualDb?: readonly (number | null)[];
}

/** Levels of one spectrum by band index, and sums and differences over ranges of them. */
export class SpectrumLevels {
  /** Distance of adjacent band indices. */
  readonly step: number;
  /** Band indices that have a level, ascending. */
  readonly indices: number[];
  readonly #levelDb = new Map<number, number>();
  readonly #usualDb = new Map<number, number>();

  constructor({ fraction, bands, levelsDb, usualDb }: LevelsOfBands) {
    this.step = fraction === 3 ? 1 : 3;
    bands.forEach(({ index }, i) => {
      const levelDb = levelsDb[i] ?? null;
      const usualLevelDb = usualDb?.[i] ?? null;
      if (levelDb !== null) this.#levelDb.set(index, levelDb);
      if (usualLevelDb !== null) this.#usualDb.set(index, usualLevelDb);
    });
    this.indices = [...this.#levelDb.keys()].sort((a, b) => bandSlot(a) - bandSlot(b));
  }

  /** Level of a range above the louder of both outer neighbours, dB; null where one is missing. */
  excessOverNeighboursDb(lowerIndex: number, upperIndex: number): number | null {
    const below = this.#levelDb.get(lowerIndex - this.step);
    const above = this.#levelDb.get(upperIndex + this.step);
    const levelDb = this.#sumDb(this.#levelDb, lowerIndex, upperIndex);
    return below === undefined || above === undefined || levelDb === null
      ? null
      : levelDb - Math.max(below, above);
  }

  /** Level of a range above the usual one of the same bands, dB; null where that is not known. */
  excessOverUsualDb(lowerIndex: number, upperIndex: number): number | null {
    const levelDb = this.#sumDb(this.#levelDb, lowerIndex, upperIndex);
    const usualDb = this.#sumDb(this.#usualDb, lowerIndex, upperIndex);
    return levelDb === null || usualDb === null ? null : levelDb - usualDb;
  }

  /** Unweighted level of a range, dB; null when a band of it has none. */
  levelDb(lowerIndex: number, upperIndex: number): number | null {
    return this.#sumDb(this.#levelDb, lowerIndex, upperIndex);
  }

  /** Part of the whole spectrum's A-weighted energy that lies in a range, 0–1. */
  aShare(lowerIndex: number, upperIndex: number): number {
    return this.#aEnergy(lowerIndex, upperIndex) / this.#aEnergy(-Infinity, Infinity);
  }

  #sumDb(levelsDb: ReadonlyMap<number, number>, lowerIndex: number, upperIndex: number): number | null {
    let energy = 0;
    for (let index = lowerIndex; index <= upperIndex; index += this.step) {
      const levelDb = levelsDb.get(index);
      if (levelDb === undefined) return null;
      energy += 10 ** (levelDb / 10);
    }
    return levelOfEnergyDb(energy);
  }

  #aEnergy(lowerIndex: number, upperIndex: number): number {
    let energy = 0;
    for (const [index, levelDb] of this.#levelDb) {
      if (lowerIndex <= index && index <= upperIndex)
        energy += 10 ** ((levelDb + aWeightOfBandDb(index)) / 10);
    }
    return energy;
  }
}
