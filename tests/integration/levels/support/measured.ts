import { bandSetOf } from '#db/queries/bandSets';
import { inTransaction } from '#db/queries/connection';
import { type StoredInterval } from '#db/queries/intervals';
import { store } from '#ingest/receive/store';
import { type BandFraction } from '#lib/acoustics/bands';

/** Numbers in [0, 1) that are the same at every run. */
export function seededNoise(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/** A stretch of a monitor's work. */
export interface Stretch {
  fromSec: number;
  toSec: number;
  intervalSec: number;
  /** Lowest and highest band index; thirds unless told otherwise. */
  bands: [number, number];
  fraction?: BandFraction;
  /** Share of intervals after which some are missing. */
  gaps?: number;
}

const NONE = -32_768;

/** Invents what a monitor would have measured: wandering levels, missing bands, flags, wind about the bound, gaps. */
export async function invent(stretch: Stretch, seed: number): Promise<StoredInterval[]> {
  const { fromSec, toSec, intervalSec, bands, fraction = 3, gaps = 0.01 } = stretch;
  const noise = seededNoise(seed);
  const indices: number[] = [];
  for (let index = bands[0]; index <= bands[1]; index += fraction === 3 ? 1 : 3) indices.push(index);
  const set = await bandSetOf(fraction, indices);
  const intervals: StoredInterval[] = [];
  let levelCentiDb = 5000;
  for (let startSec = fromSec; startSec + intervalSec <= toSec; startSec += intervalSec) {
    levelCentiDb = Math.round(0.97 * levelCentiDb + 150 + 600 * (noise() - 0.5));
    if (noise() < gaps) startSec += intervalSec * Math.ceil(40 * noise());
    if (startSec + intervalSec > toSec) break;
    const sometimes = (share: number, centiDb: number) => (noise() < share ? centiDb : null);
    const peakCentiDb = levelCentiDb + Math.round(2500 * noise());
    intervals.push({
      startSec,
      durationSec: intervalSec,
      laeqCentiDb: levelCentiDb,
      lafmaxCentiDb: sometimes(0.9, peakCentiDb),
      lafminCentiDb: sometimes(0.9, levelCentiDb - Math.round(1500 * noise())),
      lceqCentiDb: sometimes(0.8, levelCentiDb + Math.round(1200 * noise())),
      lcpeakCentiDb: sometimes(0.3, peakCentiDb + 1200),
      bandSetId: set.id,
      bandFraction: set.fraction,
      bandIndices: set.indices,
      levelsCentiDb: Int16Array.from(indices, () =>
        noise() < 0.03 ? NONE : levelCentiDb - Math.round(3000 * noise() - 300),
      ),
      flags: flagsOf(noise()),
      windSpeedMs: noise() < 0.2 ? null : windOf(noise()),
      windDirectionDeg: null,
      temperatureC: null,
      batteryV: null,
      receivedAtSec: startSec + intervalSec + (noise() < 0.05 ? 7200 : 20),
    });
  }
  return intervals;
}

/** One flag in a tenth of cases: each of the nine. */
function flagsOf(share: number): number {
  return share < 0.1 ? 1 << Math.floor(share * 90) : 0;
}

/** Mostly calm; now and then just at the bound of 5 m/s, which counts, and just above it. */
function windOf(share: number): number {
  if (share < 0.02) return 5;
  if (share < 0.04) return 5.01;
  return Math.round(share * 510) / 100;
}

/** Stores intervals as receiving does: with marks for what must be recomputed. */
export async function storeMeasured(stationId: number, intervals: readonly StoredInterval[]): Promise<void> {
  await inTransaction((transaction) => store(stationId, intervals, [], new Date(), transaction));
}
