import { type QuarterHour } from '#db/queries/quarterHours';
import { bandSlot } from '#lib/acoustics/bands';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { addAt, lowerAt, raiseAt, setBitsAt, type Columns } from './columns';
import { meanCentiDb } from './intervalColumns';

/** Fills the columns that some quarter-hours (ascending) fall in: energy means of what counts; nothing else is kept in them. */
export function fillFromQuarters(columns: Columns, quarters: readonly QuarterHour[]): void {
  const { plan } = columns;
  let at = -1;
  let levels = new PeriodAccumulator();
  for (const quarter of quarters) {
    const column = Math.floor((quarter.startSec - plan.fromSec) / plan.stepSec);
    if (column !== at) {
      if (at >= 0) fillLevels(columns, at, levels);
      at = column;
      levels = new PeriodAccumulator();
    }
    levels.merge(quarter);
    const { validSec, excludedSec } = quarter.sums;
    addAt(columns.presentSec, at, validSec + excludedSec);
    addAt(columns.validSec, at, validSec);
    addAt(columns.lateSec, at, quarter.lateSec);
    setBitsAt(columns.flagBits, at, quarter.flagBits);
    setBitsAt(columns.reasonBits, at, quarter.reasonBits);
  }
  if (at >= 0) fillLevels(columns, at, levels);
}

function fillLevels(columns: Columns, at: number, { sums }: PeriodAccumulator): void {
  columns.laeqCentiDb[at] = meanCentiDb(sums.aEnergySec, sums.validSec);
  raiseAt(columns.lafmaxCentiDb, at, sums.lafmaxCentiDb);
  lowerAt(columns.lafminCentiDb, at, sums.lafminCentiDb);
  if (sums.bandFraction !== columns.bands[0]?.fraction) return;
  columns.bands.forEach(({ index }, place) => {
    const slot = bandSlot(index);
    columns.levelsCentiDb[at * columns.bands.length + place] = meanCentiDb(
      sums.bandEnergySec[slot] ?? 0,
      sums.bandValidSec[slot] ?? 0,
    );
  });
}
