import { type StoredInterval } from '#db/queries/intervals';
import { bandAt, bandLabel } from '#lib/acoustics/bands';
import { spectrumBlocks } from '#lib/acoustics/spectrumBlocks';
import { surveyTones, thirdsTenthsOfCentiDb, TONAL_AVERAGING_SEC } from '#lib/acoustics/tonality';
import { type Tonality } from '#lib/contracts/figureSheet';

/** How often single blocks of at least 60 s have a tone by the survey method, band by band. */
export class BlockTones {
  #assessedSec = 0;
  readonly #secOfBand = new Map<number, number>();

  /** Adds valid intervals, ascending. Octaves are left out: they cannot be assessed. */
  add(intervals: readonly StoredInterval[]): void {
    for (const run of runsOfOneBandSet(intervals)) this.#addRun(run);
  }

  /** Null where nothing could be assessed. */
  result(): Tonality['blocks'] {
    if (this.#assessedSec === 0) return null;
    const bands = [...this.#secOfBand]
      .sort(([, a], [, b]) => b - a)
      .map(([index, sec]) => ({ label: bandLabel(bandAt(3, index)), share: sec / this.#assessedSec }));
    return { assessedSec: this.#assessedSec, bands };
  }

  #addRun(run: readonly StoredInterval[]): void {
    const indices = run[0]?.bandIndices;
    if (!indices || indices.length < 3) return;
    for (const { levelsCentiDb, durationSec } of spectrumBlocks(run, TONAL_AVERAGING_SEC)) {
      this.#assessedSec += durationSec;
      for (const { lowerIndex } of surveyTones(thirdsTenthsOfCentiDb(levelsCentiDb, indices))) {
        this.#secOfBand.set(lowerIndex, (this.#secOfBand.get(lowerIndex) ?? 0) + durationSec);
      }
    }
  }
}

function runsOfOneBandSet(intervals: readonly StoredInterval[]): StoredInterval[][] {
  const runs: StoredInterval[][] = [];
  for (const interval of intervals) {
    if (interval.bandFraction !== 3) continue;
    const run = runs.at(-1);
    if (run && run[0]?.bandSetId === interval.bandSetId) run.push(interval);
    else runs.push([interval]);
  }
  return runs;
}
