import { type Connection } from '#db/queries/connection';
import { selectQuarterEnergies, type QuarterEnergy } from '#db/queries/quarterEnergies';
import { levelOfEnergyDb } from '#lib/acoustics/energy';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { quartersOfIntervals } from './currentQuarters';
import { dirtySpans } from './dirtySpans';
import { sumIntervals, type LevelSource } from './intervalSums';
import { overlapsAny, type Span } from './spans';

/** What A-weighted levels and coverage of a period are taken from. */
export type EnergySums = Omit<QuarterEnergy, 'startSec'>;

/**
 * A station's quarter-hours of a stretch of time, read once, for the levels and the coverage of many periods within it: a
 * fraction of the work of whole sums. Those that wait for recomputation are summed from their intervals.
 */
export class EnergySeries {
  readonly #source: LevelSource;
  readonly #firstSec: number;
  /** By quarter-hours from the first. */
  readonly #quarters: readonly (EnergySums | undefined)[];
  readonly #conn: Connection;

  private constructor(source: LevelSource, span: Span, quarters: readonly QuarterEnergy[], conn: Connection) {
    this.#source = source;
    this.#firstSec = span.fromSec;
    this.#conn = conn;
    const placed = new Array<EnergySums | undefined>((span.toSec - span.fromSec) / QUARTER_SEC);
    for (const quarter of quarters) placed[(quarter.startSec - span.fromSec) / QUARTER_SEC] = quarter;
    this.#quarters = placed;
  }

  /** Reads the quarter-hours that `span` touches. */
  static async read(source: LevelSource, span: Span, conn: Connection): Promise<EnergySeries> {
    const whole = { fromSec: quarterAt(span.fromSec), toSec: quarterAt(span.toSec + QUARTER_SEC - 1) };
    const { id } = source.station;
    // Marks are read before rows: what is recomputed in between is then counted anew, never missed.
    const dirty = await dirtySpans(id, whole, conn);
    const rows = await selectQuarterEnergies(id, whole.fromSec, whole.toSec, conn);
    const quarters = rows.filter(({ startSec }) => !overlapsAny(dirty, startSec, startSec + QUARTER_SEC));
    for (const part of dirty) {
      const found = await quartersOfIntervals(source, part, conn);
      quarters.push(...found.map(({ startSec, sums }) => ({ ...sums, startSec })));
    }
    return new EnergySeries(source, whole, quarters, conn);
  }

  /** Sums of a period within the series; ends within a quarter-hour are counted from intervals. */
  async sums({ fromSec, toSec }: Span): Promise<EnergySums> {
    const whole = noEnergy();
    const firstWhole = Math.min(quarterAt(fromSec + QUARTER_SEC - 1), toSec);
    const endOfWhole = Math.max(quarterAt(toSec), firstWhole);
    const end = (endOfWhole - this.#firstSec) / QUARTER_SEC;
    for (let at = Math.ceil((firstWhole - this.#firstSec) / QUARTER_SEC); at < end; at += 1) {
      const quarter = this.#quarters[at];
      if (quarter) addEnergy(whole, quarter);
    }
    for (const ragged of [
      { fromSec, toSec: firstWhole },
      { fromSec: endOfWhole, toSec },
    ]) {
      if (ragged.fromSec >= ragged.toSec) continue;
      const { sums } = await sumIntervals(this.#source, ragged, { bandClasses: false }, this.#conn);
      addEnergy(whole, sums);
    }
    return whole;
  }
}

/** Sums of nothing. */
export function noEnergy(): EnergySums {
  return { validSec: 0, excludedSec: 0, aEnergySec: 0, lafmaxCentiDb: null };
}

/** Adds the sums of one period to those of another. */
export function addEnergy(into: EnergySums, of: EnergySums): void {
  into.validSec += of.validSec;
  into.excludedSec += of.excludedSec;
  into.aEnergySec += of.aEnergySec;
  const { lafmaxCentiDb } = of;
  if (lafmaxCentiDb !== null && lafmaxCentiDb > (into.lafmaxCentiDb ?? -Infinity)) {
    into.lafmaxCentiDb = lafmaxCentiDb;
  }
}

/** LAeq in dB over the valid seconds; null when there are none. */
export function laeqDbOf({ aEnergySec, validSec }: EnergySums): number | null {
  return validSec === 0 ? null : levelOfEnergyDb(aEnergySec / validSec);
}
