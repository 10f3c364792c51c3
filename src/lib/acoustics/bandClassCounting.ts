import { bandSlot, FIRST_BAND_INDEX, LAST_BAND_INDEX, type BandFraction } from './bands';
import { energyOfCentiDb } from './energy';
import { tenthsOfEnergy } from './energyClass';
import { NO_LEVEL_CENTI_DB } from './levelRange';
import { octaveIndexOf, octaveSlot, thirdsOfOctave } from './octaves';
import { type BandClassCounts } from './periodSums';
import { centiDbToTenths } from './rounding';

/** Band levels of an interval, clipped to the period by duration. */
export interface BandInterval {
  durationSec: number;
  bandFraction: BandFraction;
  /** Unweighted band levels beside `bandIndices`; −32768 = none. */
  levelsCentiDb: Int16Array;
  /** Intervals of one band set share the array. */
  bandIndices: Int8Array;
}

/** Levels of one band or octave with their seconds, filled again for each. */
interface Column {
  tenths: Int16Array;
  secs: Float64Array;
  length: number;
}

/**
 * Counts the distributions of bands, and of the octaves of thirds, over some intervals into `into`: band by band instead of
 * interval by interval, several times as fast. An octave's sample is the energy sum of an interval's three thirds; one that
 * lacks a third has none.
 */
export function countBandClasses(intervals: readonly BandInterval[], into: BandClassCounts): void {
  for (let from = 0; from < intervals.length;) {
    const indices = intervals[from]?.bandIndices;
    let to = from + 1;
    while (to < intervals.length && intervals[to]?.bandIndices === indices) to += 1;
    countAlike(from === 0 && to === intervals.length ? intervals : intervals.slice(from, to), into);
    from = to;
  }
}

/** Intervals that all have the same bands. */
function countAlike(intervals: readonly BandInterval[], into: BandClassCounts): void {
  const [first] = intervals;
  if (!first) return;
  const { length } = intervals;
  const column: Column = { tenths: new Int16Array(length), secs: new Float64Array(length), length: 0 };
  first.bandIndices.forEach((bandIndex, place) => {
    fillBand(column, intervals, place);
    into.bands[checkedSlot(bandIndex)]?.addEach(column.tenths, column.secs, column.length);
  });
  if (first.bandFraction !== 3) return;
  for (const octaveIndex of new Set(Array.from(first.bandIndices, octaveIndexOf))) {
    const places = thirdsOfOctave(octaveIndex).map((third) => first.bandIndices.indexOf(third));
    if (places.includes(-1)) continue;
    fillOctave(column, intervals, places);
    into.octaves[octaveSlot(octaveIndex)]?.addEach(column.tenths, column.secs, column.length);
  }
}

function fillBand(column: Column, intervals: readonly BandInterval[], place: number): void {
  column.length = 0;
  for (const { levelsCentiDb, durationSec } of intervals) {
    const centiDb = levelsCentiDb[place] ?? NO_LEVEL_CENTI_DB;
    if (centiDb !== NO_LEVEL_CENTI_DB) append(column, centiDbToTenths(centiDb), durationSec);
  }
}

function fillOctave(column: Column, intervals: readonly BandInterval[], places: readonly number[]): void {
  const [low = 0, middle = 0, high = 0] = places;
  column.length = 0;
  for (const { levelsCentiDb, durationSec } of intervals) {
    const lowCentiDb = levelsCentiDb[low] ?? NO_LEVEL_CENTI_DB;
    const middleCentiDb = levelsCentiDb[middle] ?? NO_LEVEL_CENTI_DB;
    const highCentiDb = levelsCentiDb[high] ?? NO_LEVEL_CENTI_DB;
    if (Math.min(lowCentiDb, middleCentiDb, highCentiDb) === NO_LEVEL_CENTI_DB) continue;
    const energy =
      energyOfCentiDb(lowCentiDb) + energyOfCentiDb(middleCentiDb) + energyOfCentiDb(highCentiDb);
    append(column, tenthsOfEnergy(energy), durationSec);
  }
}

function append(column: Column, tenths: number, sec: number): void {
  column.tenths[column.length] = tenths;
  column.secs[column.length] = sec;
  column.length += 1;
}

function checkedSlot(bandIndex: number): number {
  if (bandIndex < FIRST_BAND_INDEX || bandIndex > LAST_BAND_INDEX) {
    throw new RangeError(`${bandIndex} is not a band index from ${FIRST_BAND_INDEX} to ${LAST_BAND_INDEX}.`);
  }
  return bandSlot(bandIndex);
}
