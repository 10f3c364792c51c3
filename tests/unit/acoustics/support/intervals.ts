import { bandRange } from '#lib/acoustics/bands';
import { type AccumulatedInterval } from '#lib/acoustics/periodStatistics';

/** Band indices of the thirds between two nominal frequencies. */
export function thirdIndices(firstHz: number, lastHz: number): Int8Array {
  return Int8Array.from(bandRange(3, firstHz, lastHz), (band) => band.index);
}

/** A minute at 50.00 dB(A) without bands; the parts that a test is about replace these. */
export function interval(parts: Partial<AccumulatedInterval> = {}): AccumulatedInterval {
  return {
    durationSec: 60,
    sampleSec: 60,
    laeqCentiDb: 5000,
    lafmaxCentiDb: null,
    lafminCentiDb: null,
    lceqCentiDb: null,
    lcpeakCentiDb: null,
    bandFraction: 3,
    levelsCentiDb: new Int16Array(0),
    bandIndices: new Int8Array(0),
    ...parts,
  };
}
