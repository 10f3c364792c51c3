import type { Connection } from '#db/queries/connection';
import { selectIntervals } from '#db/queries/intervals';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import { ldenDb, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { periodsOf } from '#lib/time/periods';
import { localDateAt } from '#lib/time/zone';
import { judgementOf, type LevelSource } from '../levels/intervalSums';
import { quantile } from '../levels/quantile';
import type { Span } from '../levels/spans';
import { weeksBefore } from '../levels/usual';
import { eventCountOf, tonalShareOf } from './intervalMeasures';
import { difference, measure, minimumFor, type Measured, type MetricRule } from './measure';
import { WindowLevels } from './windowLevels';

const USUAL_WEEKS = 8;
const LAEQ = { metric: 'LAeq', bandFraction: null, bandIndex: null } as const satisfies MetricRule;

/** What is read of one station to measure windows, asked for in order of time: the worker and trials measure by this alone. */
export class WindowEvidence {
  readonly levels: WindowLevels;
  /** The weeks before, each read on its own. */
  readonly #weeks: WindowLevels[];

  constructor(
    private readonly source: LevelSource,
    private readonly conn: Connection,
  ) {
    this.levels = new WindowLevels(source, conn);
    this.#weeks = Array.from({ length: USUAL_WEEKS }, () => new WindowLevels(source, conn));
  }

  /** What a window came to. */
  async measure(rule: MetricRule & { minimumCoverage: number | null }, window: Span): Promise<Measured> {
    switch (rule.metric) {
      case 'Lden':
        return this.lden(window);
      case 'LAeqLessUsual':
        return this.riseAboveUsual(rule, window);
      case 'tonalShare':
      case 'eventCount':
        return this.ofIntervals(rule, window);
      default:
        return measure(rule, (await this.levels.of(window)).sums);
    }
  }

  /**
   * Lden of the periods that make the window, with the nominal hours. The seconds it stands on are the window's by the share of the
   * least covered period: a night that is missing is not made good by the day.
   */
  private async lden(window: Span): Promise<Measured> {
    const { timeZone, scheme } = pickSettings(this.source.timeline, window.fromSec);
    const levelsDb: Record<PeriodKind, number | null> = { day: null, evening: null, night: null };
    let coverage = 1;
    for (const { kind, fromSec, toSec } of periodsOf(
      localDateAt(window.fromSec, timeZone),
      scheme,
      timeZone,
    )) {
      const { levelDb, validSec } = measure(LAEQ, (await this.levels.of({ fromSec, toSec })).sums);
      levelsDb[kind] = levelDb;
      coverage = Math.min(coverage, validSec / (toSec - fromSec));
    }
    return { levelDb: ldenDb(scheme, levelsDb), validSec: coverage * (window.toSec - window.fromSec) };
  }

  /** LAeq above the median of the same clock window in the eight weeks before, of those that have the coverage; at least one must. */
  private async riseAboveUsual(
    rule: MetricRule & { minimumCoverage: number | null },
    window: Span,
  ): Promise<Measured> {
    const { timeline } = this.source;
    const now = measure(LAEQ, (await this.levels.of(window)).sums);
    const settings: NetworkSettings = pickSettings(timeline, window.fromSec);
    const minimum = minimumFor(rule, settings) ?? 0;
    const usualDb: number[] = [];
    for (const [at, levels] of this.#weeks.entries()) {
      const before = weeksBefore(window, at + 1, settings.timeZone);
      const { levelDb, validSec } = measure(LAEQ, (await levels.of(before)).sums);
      const isCovered = validSec / (before.toSec - before.fromSec) >= minimum - 1e-9;
      if (levelDb !== null && isCovered) usualDb.push(levelDb);
    }
    return { levelDb: difference(now.levelDb, quantile(usualDb, 0.5)), validSec: now.validSec };
  }

  private async ofIntervals(rule: MetricRule, window: Span): Promise<Measured> {
    const judgement = await judgementOf(this.source, window, this.conn);
    const intervals = await selectIntervals(this.source.station.id, window.fromSec, window.toSec, this.conn);
    return rule.metric === 'tonalShare'
      ? tonalShareOf(intervals, window, judgement)
      : eventCountOf(intervals, window, judgement, {
          thresholdTenths: rule.eventTenths ?? NaN,
          minimumSec: rule.eventMinimumSec ?? 0,
        });
  }
}
