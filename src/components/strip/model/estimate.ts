import { type Band } from '#lib/acoustics/bands';
import { LevelClassCounts } from '#lib/acoustics/classCounts';
import { energyOfCentiDb, levelOfEnergyDb } from '#lib/acoustics/energy';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { type Run } from './runs';
import { type StripColumns } from './stripColumns';
import { visibleParts } from './visibleParts';

/** Figures of a selection. Levels in dB, null where nothing contributes. */
export interface SelectionFigures {
  /** Seconds of the selection that have passed. */
  expectedSec: number;
  validSec: number;
  laeqDb: number | null;
  lafmaxDb: number | null;
  la10Db: number | null;
  la90Db: number | null;
  bands: readonly Band[];
  /** Beside `bands`, unweighted. */
  bandLeqDb: (number | null)[];
}

/** A column counts in an estimate when at least this share of what it holds is valid. */
const LEAST_VALID_SHARE = 0.5;

/**
 * Figures of a stretch of time from the columns on the screen, to show something at once: columns that are mostly valid, the
 * ones at the edges clipped by duration. Where a column is one base interval and all of it is valid this is what the server
 * will answer; otherwise it is an estimate.
 * Null where the layers do not hold the whole stretch.
 */
export function estimateFigures(
  layers: readonly StripColumns[],
  run: Run,
  intervalSec: number,
  nowSec: number,
): SelectionFigures | null {
  const elapsed = { fromSec: run.fromSec, toSec: Math.min(run.toSec, Math.ceil(nowSec)) };
  const expectedSec = Math.max(0, elapsed.toSec - elapsed.fromSec);
  const parts = visibleParts(layers, elapsed);
  const heldSec = parts.reduce((sum, { within }) => sum + within.toSec - within.fromSec, 0);
  const bands = parts[0]?.columns.bands;
  if (heldSec < expectedSec || !bands) return null;
  const sums = new Sums(bands.length);
  for (const { columns, within } of parts) {
    const first = Math.floor((within.fromSec - columns.fromSec) / columns.stepSec);
    const end = Math.ceil((within.toSec - columns.fromSec) / columns.stepSec);
    for (let at = first; at < end; at += 1) sums.addColumn(columns, at, within);
  }
  const isOfIntervals = parts.every(({ columns }) => columns.stepSec === intervalSec);
  return { bands, expectedSec, ...sums.figures(isOfIntervals ? intervalSec : null) };
}

class Sums {
  #validSec = 0;
  #energySec = 0;
  #lafmaxCentiDb = NO_LEVEL_CENTI_DB;
  readonly #classes = new LevelClassCounts();
  readonly #bandEnergySec: Float64Array;
  readonly #bandSec: Float64Array;

  constructor(bands: number) {
    this.#bandEnergySec = new Float64Array(bands);
    this.#bandSec = new Float64Array(bands);
  }

  addColumn(columns: StripColumns, at: number, run: Run): void {
    const presentSec = columns.presentSec[at] ?? 0;
    const validSec = columns.validSec[at] ?? 0;
    const laeq = columns.laeqCentiDb[at] ?? NO_LEVEL_CENTI_DB;
    if (laeq === NO_LEVEL_CENTI_DB || validSec < presentSec * LEAST_VALID_SHARE || validSec === 0) return;
    const fromSec = columns.fromSec + at * columns.stepSec;
    const insideSec = Math.min(run.toSec, fromSec + columns.stepSec) - Math.max(run.fromSec, fromSec);
    const sec = Math.round((validSec * insideSec) / columns.stepSec);
    this.#validSec += sec;
    this.#energySec += energyOfCentiDb(laeq) * sec;
    this.#classes.add(laeq, sec);
    this.#lafmaxCentiDb = Math.max(this.#lafmaxCentiDb, columns.lafmaxCentiDb[at] ?? NO_LEVEL_CENTI_DB);
    this.#addBands(columns, at, sec);
  }

  figures(sampleSec: number | null): Omit<SelectionFigures, 'expectedSec' | 'bands'> {
    return {
      validSec: this.#validSec,
      laeqDb: meanDb(this.#energySec, this.#validSec),
      lafmaxDb: this.#lafmaxCentiDb === NO_LEVEL_CENTI_DB ? null : this.#lafmaxCentiDb / 100,
      la10Db: this.#classes.exceedanceLevelDb(10, sampleSec),
      la90Db: this.#classes.exceedanceLevelDb(90, sampleSec),
      bandLeqDb: Array.from(this.#bandEnergySec, (energySec, i) => meanDb(energySec, this.#bandSec[i] ?? 0)),
    };
  }

  #addBands(columns: StripColumns, at: number, sec: number): void {
    const bands = columns.bands.length;
    for (let band = 0; band < bands; band += 1) {
      const centiDb = columns.levelsCentiDb[at * bands + band] ?? NO_LEVEL_CENTI_DB;
      if (centiDb === NO_LEVEL_CENTI_DB) continue;
      this.#bandEnergySec[band] = (this.#bandEnergySec[band] ?? 0) + energyOfCentiDb(centiDb) * sec;
      this.#bandSec[band] = (this.#bandSec[band] ?? 0) + sec;
    }
  }
}

function meanDb(energySec: number, sec: number): number | null {
  return sec === 0 ? null : levelOfEnergyDb(energySec / sec);
}
