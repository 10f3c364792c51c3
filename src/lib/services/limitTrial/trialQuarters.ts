import type { Connection } from '#db/queries/connection';
import type { NewLimitVersion } from '#db/queries/limits';
import { selectQuarterBands, type QuarterBands } from '#db/queries/quarterBands';
import { selectQuarterEnergies, type QuarterEnergy } from '#db/queries/quarterEnergies';
import { bandSlot, FIRST_BAND_INDEX, LAST_BAND_INDEX } from '#lib/acoustics/bands';
import { thirdsOfOctave } from '#lib/acoustics/octaves';
import { emptySums } from '#lib/acoustics/periodSums';
import { currentQuarters } from '#lib/services/levels/currentQuarters';
import { dirtySpans } from '#lib/services/levels/dirtySpans';
import type { LevelSource } from '#lib/services/levels/intervalSums';
import { overlapsAny, type Span } from '#lib/services/levels/spans';
import { sumsByGrain } from '#lib/services/limits/grains';
import type { MeasurableSums } from '#lib/services/limits/measure';
import { QUARTER_SEC } from '#lib/time/quarters';
import type { TrialParts } from './parts';

/** A quarter-hour, or five minutes, as far as limits look at it. */
export interface TrialQuarter {
  startSec: number;
  sums: MeasurableSums;
}

/** What is read of each part. */
export interface Wanted {
  parts: TrialParts;
  partSec: number;
  bands: Pick<NewLimitVersion, 'bandFraction' | 'bandIndex' | 'bandToIndex'>;
}

/** Shared by every quarter-hour that was read without what stands in it; nobody writes to it. */
const NOTHING: MeasurableSums = emptySums({ bandClasses: false });

/**
 * Quarter-hours of a station in `fromSec <= t < toSec` (whole quarter-hours), ascending and current; or, as `partSec` says, fives
 * of minutes from the intervals.
 */
export async function trialQuarters(
  source: LevelSource,
  span: Span,
  { parts, partSec, bands }: Wanted,
  conn: Connection,
): Promise<TrialQuarter[]> {
  if (partSec !== QUARTER_SEC) return sumsByGrain(source, span, conn);
  if (parts === 'distributions') return currentQuarters(source, span, { bands: false }, conn);
  // Marks are read before rows: what is recomputed in between is then made from its intervals, never missed.
  const { id } = source.station;
  const dirty = await dirtySpans(id, span, conn);
  const rows =
    parts === 'energies'
      ? (await selectQuarterEnergies(id, span.fromSec, span.toSec, conn)).map(quarterOfEnergy)
      : (await selectQuarterBands(id, span, slotsOf(bands), conn)).map(quarterOfBands);
  if (dirty.length === 0) return rows;
  const found = rows.filter(({ startSec }) => !overlapsAny(dirty, startSec, startSec + QUARTER_SEC));
  for (const part of dirty) {
    for (const { startSec, sums } of await currentQuarters(source, part, { bands: parts === 'bands' }, conn))
      found.push({ startSec, sums });
  }
  return found.sort((a, b) => a.startSec - b.startSec);
}

/** Slots of the bands that a limit is about, of stations with thirds and with octaves. */
function slotsOf({ bandFraction, bandIndex, bandToIndex }: Wanted['bands']) {
  if (bandIndex === null) throw new RangeError('A band limit names no band.');
  const ends = [bandIndex, bandToIndex ?? bandIndex];
  const indices = (
    bandFraction === 1 ? [...ends, ...ends.flatMap((index) => thirdsOfOctave(index))] : ends
  ).filter((index) => FIRST_BAND_INDEX <= index && index <= LAST_BAND_INDEX);
  const slots = indices.map(bandSlot);
  return { firstSlot: Math.min(...slots), lastSlot: Math.max(...slots) };
}

/** Field by field, as below: a year of stations makes hundreds of thousands of them. */
function quarterOfEnergy({ startSec, validSec, aEnergySec, lafmaxCentiDb }: QuarterEnergy): TrialQuarter {
  return { startSec, sums: sumsWith(validSec, aEnergySec, lafmaxCentiDb, NOTHING) };
}

function quarterOfBands(quarter: QuarterBands): TrialQuarter {
  return { startSec: quarter.startSec, sums: sumsWith(quarter.validSec, 0, null, quarter) };
}

function sumsWith(
  validSec: number,
  aEnergySec: number,
  lafmaxCentiDb: number | null,
  bands: Pick<MeasurableSums, 'bandFraction' | 'isBandFractionMixed' | 'bandEnergySec' | 'bandValidSec'>,
): MeasurableSums {
  return {
    validSec,
    aEnergySec,
    cEnergySec: 0,
    cValidSec: 0,
    lafmaxCentiDb,
    sampleSec: null,
    aClasses: NOTHING.aClasses,
    bandFraction: bands.bandFraction,
    isBandFractionMixed: bands.isBandFractionMixed,
    bandEnergySec: bands.bandEnergySec,
    bandValidSec: bands.bandValidSec,
  };
}
