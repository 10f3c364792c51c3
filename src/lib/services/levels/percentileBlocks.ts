import { type QuarterHour } from '#db/queries/quarterHours';
import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { emptySums, noteSampleSec, type PeriodSums } from '#lib/acoustics/periodSums';
import { toCentiDb } from '#lib/acoustics/rounding';
import { type PercentileColumns } from '#lib/contracts/spectrogramBinary';
import { type ColumnPlan } from './columnPlan';
import { type Span } from './spans';

/** Lengths that divide a day, whole quarter-hours. */
const LENGTHS_SEC = [900, 1800, 3600, 7200, 10_800, 21_600, 43_200, 86_400] as const;
const LONGEST_SEC = 86_400;
/** Twice what L10 and L90 need, so that a block with gaps has them too. */
const SAMPLES = 60;

/** Length of the blocks of UTC that exceedance levels beside columns are of: no shorter than a column, and long enough to have them. */
function blockSecOf(stepSec: number, intervalSec: number): number {
  return LENGTHS_SEC.find((sec) => sec >= Math.max(stepSec, SAMPLES * intervalSec)) ?? LONGEST_SEC;
}

/** LA10, LA50 and LA90 of blocks of UTC, gathered from the distributions of quarter-hours. */
export class PercentileBlocks {
  /** The whole blocks that the columns touch: what must be added. */
  readonly span: Span;
  readonly #plan: ColumnPlan;
  readonly #blockSec: number;
  readonly #sums = new Map<number, PeriodSums>();

  constructor(plan: ColumnPlan, intervalSec: number) {
    this.#plan = plan;
    this.#blockSec = blockSecOf(plan.stepSec, intervalSec);
    const endSec = plan.fromSec + plan.count * plan.stepSec;
    this.span = {
      fromSec: Math.floor(plan.fromSec / this.#blockSec) * this.#blockSec,
      toSec: Math.ceil(endSec / this.#blockSec) * this.#blockSec,
    };
  }

  /** Adds quarter-hours, none of them twice. */
  add(quarters: readonly QuarterHour[]): void {
    for (const { startSec, sums } of quarters) {
      const at = Math.floor(startSec / this.#blockSec);
      const block = this.#sums.get(at) ?? emptySums({ bandClasses: false });
      this.#sums.set(at, block);
      noteSampleSec(block, sums.sampleSec, sums.isSampleMixed);
      block.aClasses.merge(sums.aClasses);
    }
  }

  /** For each column the levels of the block that it begins in; none where a block has too few samples. */
  columns(): PercentileColumns {
    const { count, fromSec, stepSec } = this.#plan;
    const none = () => new Int16Array(count).fill(NO_LEVEL_CENTI_DB);
    const columns = {
      blockSec: this.#blockSec,
      la10CentiDb: none(),
      la50CentiDb: none(),
      la90CentiDb: none(),
    };
    const levels = new Map([...this.#sums].map(([at, sums]) => [at, levelsOf(sums)]));
    for (let column = 0; column < count; column += 1) {
      const held = levels.get(Math.floor((fromSec + column * stepSec) / this.#blockSec));
      if (!held) continue;
      [columns.la10CentiDb[column], columns.la50CentiDb[column], columns.la90CentiDb[column]] = held;
    }
    return columns;
  }
}

function levelsOf(sums: PeriodSums): [number, number, number] {
  const levels = new PeriodAccumulator({ from: sums });
  const of = (percent: number) => {
    const levelDb = levels.exceedanceLevelDb(percent);
    return levelDb === null ? NO_LEVEL_CENTI_DB : toCentiDb(levelDb);
  };
  return [of(10), of(50), of(90)];
}
