import { energyOfCentiDb } from '#lib/acoustics/energy';
import { type ShapeMatch } from '#lib/acoustics/shapeSearch';

/** Consecutive alike minutes of one station, with gaps of a few minutes bridged. */
export interface Spell {
  stationId: number;
  fromSec: number;
  /** End of its last alike minute. */
  toSec: number;
  /** Alike minutes in it. */
  minutes: number;
  /** RMS difference in dB of its most alike minute, and the mean over its alike minutes. */
  bestRmsDb: number;
  meanRmsDb: number;
  /** LAeq of its alike minutes, dB. */
  laeqDb: number;
}

/** Spells that are kept; of more the most alike stay. */
export const MOST_SPELLS = 1000;

interface OpenSpell {
  fromSec: number;
  toSec: number;
  minutes: number;
  bestRmsDb: number;
  rmsSumDb: number;
  energySum: number;
}

/** Joins alike minutes, given station by station in order of time, into spells. */
export class SpellList {
  #kept: Spell[] = [];
  #open: (OpenSpell & { stationId: number }) | null = null;
  /** Of the least alike spell that stays when there are enough. */
  #mostRmsDb = Infinity;
  /** All that were found, kept or not. */
  found = 0;

  /** Minutes without likeness that are bridged. */
  constructor(private readonly gapMinutes: number) {}

  add(stationId: number, startSec: number, { rmsDb, laeqCentiDb }: Readonly<ShapeMatch>): void {
    const open = this.#open;
    const continues =
      open !== null && open.stationId === stationId && startSec - open.toSec <= this.gapMinutes * 60;
    if (!continues) this.#close();
    const spell = (continues && open) || this.#begin(stationId, startSec);
    spell.toSec = startSec + 60;
    spell.minutes += 1;
    spell.bestRmsDb = Math.min(spell.bestRmsDb, rmsDb);
    spell.rmsSumDb += rmsDb;
    spell.energySum += energyOfCentiDb(laeqCentiDb);
  }

  /** Those that are kept, most alike first. */
  finish(): Spell[] {
    this.#close();
    this.#prune();
    return this.#kept;
  }

  #begin(stationId: number, fromSec: number) {
    this.found += 1;
    this.#open = {
      stationId,
      fromSec,
      toSec: fromSec,
      minutes: 0,
      bestRmsDb: Infinity,
      rmsSumDb: 0,
      energySum: 0,
    };
    return this.#open;
  }

  #close(): void {
    const open = this.#open;
    this.#open = null;
    // What is less alike than all that stay would be sorted out again.
    if (open === null || open.bestRmsDb > this.#mostRmsDb) return;
    const { stationId, fromSec, toSec, minutes, bestRmsDb, rmsSumDb, energySum } = open;
    const laeqDb = 10 * Math.log10(energySum / minutes);
    const meanRmsDb = rmsSumDb / minutes;
    this.#kept.push({ stationId, fromSec, toSec, minutes, bestRmsDb, meanRmsDb, laeqDb });
    if (this.#kept.length >= 4 * MOST_SPELLS) this.#prune();
  }

  #prune(): void {
    this.#kept.sort((a, b) => a.bestRmsDb - b.bestRmsDb || a.fromSec - b.fromSec);
    this.#kept = this.#kept.slice(0, MOST_SPELLS);
    this.#mostRmsDb = this.#kept[MOST_SPELLS - 1]?.bestRmsDb ?? Infinity;
  }
}
