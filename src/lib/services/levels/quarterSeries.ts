import { type Connection } from '#db/queries/connection';
import { type QuarterHour } from '#db/queries/quarterHours';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type PeriodSums } from '#lib/acoustics/periodSums';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { assumedQuarters } from './assumedQuarters';
import { currentQuarters } from './currentQuarters';
import { sumIntervals, type LevelSource } from './intervalSums';
import { movedQuarters } from './movedQuarters';
import { type Span } from './spans';

/**
 * A station's quarter-hours of a stretch of time, read once, so that many periods within it can be summed: without bands. Those
 * that wait for recomputation are summed from their intervals.
 */
export class QuarterSeries {
  readonly #source: LevelSource;
  readonly #quarters: ReadonlyMap<number, PeriodSums>;
  readonly #conn: Connection;

  private constructor(source: LevelSource, quarters: ReadonlyMap<number, PeriodSums>, conn: Connection) {
    this.#source = source;
    this.#quarters = quarters;
    this.#conn = conn;
  }

  /** Reads the quarter-hours that `span` touches. */
  static async read(source: LevelSource, span: Span, conn: Connection): Promise<QuarterSeries> {
    const whole = { fromSec: quarterAt(span.fromSec), toSec: quarterAt(span.toSec + QUARTER_SEC - 1) };
    return QuarterSeries.of(source, await QuarterSeries.#rows(source, whole, conn), conn);
  }

  /** A series of quarter-hours that were read already and cover whatever will be asked of it. */
  static of(source: LevelSource, rows: readonly QuarterHour[], conn: Connection): QuarterSeries {
    const quarters = new Map(rows.map(({ startSec, sums }) => [startSec, sums]));
    return new QuarterSeries(source, quarters, conn);
  }

  static #rows(source: LevelSource, whole: Span, conn: Connection): Promise<QuarterHour[]> {
    const { alsoExcluded, moved } = source;
    if (alsoExcluded) return assumedQuarters(source, whole, alsoExcluded, conn);
    if (moved) return movedQuarters(source, whole, moved, conn);
    return currentQuarters(source, whole, { bands: false }, conn);
  }

  /** Levels of a period within the series; ends within a quarter-hour are counted from intervals. */
  async levels({ fromSec, toSec }: Span): Promise<PeriodAccumulator> {
    const whole = new PeriodAccumulator();
    const firstWhole = Math.min(quarterAt(fromSec + QUARTER_SEC - 1), toSec);
    const endOfWhole = Math.max(quarterAt(toSec), firstWhole);
    for (let startSec = firstWhole; startSec < endOfWhole; startSec += QUARTER_SEC) {
      const sums = this.#quarters.get(startSec);
      if (sums) whole.merge({ sums });
    }
    for (const ragged of [
      { fromSec, toSec: firstWhole },
      { fromSec: endOfWhole, toSec },
    ]) {
      if (ragged.fromSec < ragged.toSec) {
        whole.merge(await sumIntervals(this.#source, ragged, { bandClasses: false }, this.#conn));
      }
    }
    return whole;
  }

  /** The first of the quarter-hours beginning in `fromSec <= t < toSec` that have the highest LAFmax; null when none has one. */
  loudestQuarter({ fromSec, toSec }: Span): { startSec: number; lafmaxCentiDb: number } | null {
    let loudest: { startSec: number; lafmaxCentiDb: number } | null = null;
    for (let startSec = quarterAt(fromSec); startSec < toSec; startSec += QUARTER_SEC) {
      const lafmaxCentiDb = this.#quarters.get(startSec)?.lafmaxCentiDb ?? null;
      if (lafmaxCentiDb !== null && lafmaxCentiDb > (loudest?.lafmaxCentiDb ?? -Infinity)) {
        loudest = { startSec, lafmaxCentiDb };
      }
    }
    return loudest;
  }
}
