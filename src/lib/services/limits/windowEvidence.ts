import type { Connection } from '#db/queries/connection';
import { selectIntervals } from '#db/queries/intervals';
import { pickSettings } from '#db/queries/networks';
import { ldenDb, type PeriodKind } from '#lib/acoustics/dayEveningNight';
import { isDismissed } from '#lib/acoustics/windRule';
import { periodsOf } from '#lib/time/periods';
import { localDateAt } from '#lib/time/zone';
import { judgementOf, type LevelSource } from '../levels/intervalSums';
import { quantile } from '../levels/quantile';
import type { Span } from '../levels/spans';
import { weeksBefore } from '../levels/usual';
import { backgroundHoursOf, hasBackgroundHours } from './backgroundHours';
import { eventMeasureOf, tonalShareOf } from './intervalMeasures';
import { backgroundDb, difference, measure, minimumFor, type Measured, type MetricRule } from './measure';
import { WindowLevels } from './windowLevels';

const USUAL_WEEKS = 8;
const LAEQ = { metric: 'LAeq', bandFraction: null, bandIndex: null } as const satisfies MetricRule;

type EvidenceRule = MetricRule & { minimumCoverage: number | null };

/** Levels of one source, each reader asked for in order of time. */
class SourceLevels {
  readonly windows: WindowLevels;
  readonly background: WindowLevels;
  /** The weeks before, each read on its own. */
  readonly weeks: WindowLevels[];

  constructor(
    readonly source: LevelSource,
    conn: Connection,
  ) {
    this.windows = new WindowLevels(source, conn);
    this.background = new WindowLevels(source, conn);
    this.weeks = Array.from({ length: USUAL_WEEKS }, () => new WindowLevels(source, conn));
  }
}

/** What is read of one station to measure windows, asked for in order of time: the worker and trials measure by this alone. */
export class WindowEvidence {
  readonly #byWind = new Map<string, SourceLevels>();

  constructor(
    private readonly source: LevelSource,
    private readonly conn: Connection,
  ) {}

  /** Levels of windows whatever a limit says of the wind. */
  get levels(): WindowLevels {
    return this.#levelsOf({}).windows;
  }

  /** What a window came to, by the intervals that count for the limit. */
  async measure(rule: EvidenceRule, window: Span): Promise<Measured> {
    const levels = this.#levelsOf(rule);
    const measured = await this.#quantity(rule, window, levels);
    const { windRule } = rule;
    if (!windRule || windRule.dismissAboveMs === null) return measured;
    return { ...measured, isDismissed: isDismissed(windRule, await levels.windows.windOf(window)) };
  }

  /** Limits that go by the same wind share what is read. */
  #levelsOf({ windRule: wind = null }: Pick<MetricRule, 'windRule'>): SourceLevels {
    const key = JSON.stringify(wind);
    const known = this.#byWind.get(key);
    if (known) return known;
    const levels = new SourceLevels({ ...this.source, wind }, this.conn);
    this.#byWind.set(key, levels);
    return levels;
  }

  async #quantity(rule: EvidenceRule, window: Span, levels: SourceLevels): Promise<Measured> {
    if (hasBackgroundHours(rule)) return this.riseAboveBackground(rule, window, levels);
    switch (rule.metric) {
      case 'Lden':
        return this.lden(window, levels);
      case 'LAeqLessUsual':
        return this.riseAboveUsual(rule, window, levels);
      case 'tonalShare':
      case 'eventCount':
      case 'eventLAE':
        return this.ofIntervals(rule, window, levels.source);
      default:
        return measure(rule, (await levels.windows.of(window)).sums);
    }
  }

  /**
   * Lden of the periods that make the window, with the nominal hours. The seconds it stands on are the window's by the share of the
   * least covered period: a night that is missing is not made good by the day.
   */
  private async lden(window: Span, { windows }: SourceLevels): Promise<Measured> {
    const { timeZone, scheme } = pickSettings(this.source.timeline, window.fromSec);
    const levelsDb: Record<PeriodKind, number | null> = { day: null, evening: null, night: null };
    let coverage = 1;
    for (const { kind, fromSec, toSec } of periodsOf(
      localDateAt(window.fromSec, timeZone),
      scheme,
      timeZone,
    )) {
      const { levelDb, validSec } = measure(LAEQ, (await windows.of({ fromSec, toSec })).sums);
      levelsDb[kind] = levelDb;
      coverage = Math.min(coverage, validSec / (toSec - fromSec));
    }
    return { levelDb: ldenDb(scheme, levelsDb), validSec: coverage * (window.toSec - window.fromSec) };
  }

  /** LAeq above the median of the same clock window in the eight weeks before, of those that have the coverage; at least one must. */
  private async riseAboveUsual(
    rule: EvidenceRule,
    window: Span,
    { windows, weeks }: SourceLevels,
  ): Promise<Measured> {
    const now = measure(LAEQ, (await windows.of(window)).sums);
    const settings = pickSettings(this.source.timeline, window.fromSec);
    const minimum = minimumFor(rule, settings) ?? 0;
    const usualDb: number[] = [];
    for (const [at, levels] of weeks.entries()) {
      const before = weeksBefore(window, at + 1, settings.timeZone);
      const { levelDb, validSec } = measure(LAEQ, (await levels.of(before)).sums);
      if (levelDb !== null && isCovered(before, validSec, minimum)) usualDb.push(levelDb);
    }
    return { levelDb: difference(now.levelDb, quantile(usualDb, 0.5)), validSec: now.validSec };
  }

  /** LAeq above the background of the limit's own hours before the window, which need the coverage of the limit, too. */
  private async riseAboveBackground(
    rule: EvidenceRule,
    window: Span,
    { windows, background }: SourceLevels,
  ): Promise<Measured> {
    const { timeline } = this.source;
    const now = measure(LAEQ, (await windows.of(window)).sums);
    const hours = backgroundHoursOf(rule, window.fromSec, timeline);
    if (!hours) return { levelDb: null, validSec: now.validSec };
    const { sums } = await background.of(hours);
    const minimum = minimumFor(rule, pickSettings(timeline, window.fromSec)) ?? 0;
    const levelDb = isCovered(hours, sums.validSec, minimum) ? backgroundDb(rule, sums) : null;
    return { levelDb: difference(now.levelDb, levelDb), validSec: now.validSec };
  }

  private async ofIntervals(rule: MetricRule, window: Span, source: LevelSource): Promise<Measured> {
    const judgement = await judgementOf(source, window, this.conn);
    const intervals = await selectIntervals(source.station.id, window.fromSec, window.toSec, this.conn);
    return rule.metric === 'tonalShare'
      ? tonalShareOf(intervals, window, judgement)
      : eventMeasureOf(intervals, window, judgement, rule);
  }
}

function isCovered({ fromSec, toSec }: Span, validSec: number, minimum: number): boolean {
  return validSec / (toSec - fromSec) >= minimum - 1e-9;
}
