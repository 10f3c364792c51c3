import type { Connection } from '#db/queries/connection';
import { selectQuarterEnergies, type QuarterEnergy } from '#db/queries/quarterEnergies';
import type { TrialParts } from './parts';
import { emptySums } from '#lib/acoustics/periodSums';
import { currentQuarters } from '#lib/services/levels/currentQuarters';
import { dirtySpans } from '#lib/services/levels/dirtySpans';
import type { LevelSource } from '#lib/services/levels/intervalSums';
import { overlapsAny, type Span } from '#lib/services/levels/spans';
import { sumsByGrain } from '#lib/services/limits/grains';
import type { MeasurableSums } from '#lib/services/limits/measure';
import { QUARTER_SEC } from '#lib/time/quarters';

/** A quarter-hour, or five minutes, as far as limits look at it. */
export interface TrialQuarter {
  startSec: number;
  sums: MeasurableSums;
}

/** Quarter-hours with bands that are read at once, seconds of them: a month. */
const BANDS_AT_ONCE_SEC = 31 * 86_400;
/** Shared by every quarter-hour that was read without bands; nobody writes to them. */
const NOTHING = emptySums({ bandClasses: false });

/**
 * Quarter-hours of a station in `fromSec <= t < toSec` (whole quarter-hours), ascending and current; or, as `partSec` says, fives
 * of minutes from the intervals. Quarter-hours without bands take a fraction of a second a year.
 */
export async function trialQuarters(
  source: LevelSource,
  { fromSec, toSec }: Span,
  { parts, partSec }: { parts: TrialParts; partSec: number },
  conn: Connection,
): Promise<TrialQuarter[]> {
  if (partSec !== QUARTER_SEC) return sumsByGrain(source, { fromSec, toSec }, conn);
  if (parts === 'energies') return energiesOf(source, { fromSec, toSec }, conn);
  const found: TrialQuarter[] = [];
  for (let from = fromSec; from < toSec; from += BANDS_AT_ONCE_SEC) {
    const part = { fromSec: from, toSec: Math.min(toSec, from + BANDS_AT_ONCE_SEC) };
    for (const { startSec, sums } of await currentQuarters(
      source,
      part,
      { bands: parts === 'bands' },
      conn,
    )) {
      found.push({ startSec, sums });
    }
  }
  return found;
}

async function energiesOf(source: LevelSource, span: Span, conn: Connection): Promise<TrialQuarter[]> {
  const { id } = source.station;
  // Marks are read before rows: what is recomputed in between is then made from its intervals, never missed.
  const dirty = await dirtySpans(id, span, conn);
  const rows = await selectQuarterEnergies(id, span.fromSec, span.toSec, conn);
  const isCurrent = ({ startSec }: QuarterEnergy) => !overlapsAny(dirty, startSec, startSec + QUARTER_SEC);
  const found = (dirty.length === 0 ? rows : rows.filter(isCurrent)).map(quarterOfEnergy);
  if (dirty.length === 0) return found;
  for (const part of dirty) {
    for (const { startSec, sums } of await currentQuarters(source, part, { bands: false }, conn)) {
      found.push({ startSec, sums });
    }
  }
  return found.sort((a, b) => a.startSec - b.startSec);
}

/** Field by field: a year of stations makes hundreds of thousands of them. */
function quarterOfEnergy({ startSec, validSec, aEnergySec, lafmaxCentiDb }: QuarterEnergy): TrialQuarter {
  const sums = {
    validSec,
    aEnergySec,
    cEnergySec: 0,
    cValidSec: 0,
    lafmaxCentiDb,
    sampleSec: null,
    aClasses: NOTHING.aClasses,
    bandFraction: null,
    isBandFractionMixed: false,
    bandEnergySec: NOTHING.bandEnergySec,
    bandValidSec: NOTHING.bandValidSec,
  };
  return { startSec, sums };
}
