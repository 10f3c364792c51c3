import { listSettings, type NetworkSettings } from '#db/queries/networks';
import { DAY_MINUTES, OUTLINE_GROUPS, type DayTrace } from '#lib/acoustics/dayTrace';
import { ShapeSearch, type IsWanted } from '#lib/acoustics/shapeSearch';
import { CivilMinutes } from './civilMinutes';
import { PatternCounter } from './pattern';
import { type JobWatch, type Progress } from '../threads/messages';
import { type SearchedStation, type SearchResult, type SearchTask } from './searchTask';
import { SpellList } from './spells';
import { daysOfStation, readDays, type StationDays } from './stationDays';

/** Days whose outlines are in memory at once: 0.6 MB. */
const DAYS_AT_ONCE = 64;
/** Days made from intervals for one search, of all stations together; more are left out and told. */
const MOST_FRESH_DAYS = 40;

/** Looks at every day of every station in turn. Memory is bounded; time grows with the days that are asked for. */
export class SearchRun {
  readonly #search: ShapeSearch;
  readonly #spells: SpellList;
  readonly #pattern = new PatternCounter();
  readonly #civil: CivilMinutes;
  readonly #startedMs = performance.now();
  #freshDays = 0;
  #isCutShort = false;

  constructor(
    private readonly task: SearchTask,
    private readonly watch: JobWatch,
  ) {
    this.#search = new ShapeSearch(task.query);
    this.#spells = new SpellList(task.gapMinutes);
    this.#civil = new CivilMinutes(task.timeZone);
  }

  async result(): Promise<SearchResult> {
    const { task } = this;
    const timeline = await listSettings(task.networkId);
    const plans: StationDays[] = [];
    for (const station of task.stations) {
      plans.push(await daysOfStation(station, task.fromSec, task.toSec));
    }
    const stations: SearchedStation[] = [];
    const progress = { done: 0, all: plans.reduce((sum, { days }) => sum + days.length, 0) };
    for (const plan of plans) stations.push(await this.#station(plan, timeline, progress));
    return {
      spells: this.#spells.finish(),
      spellsFound: this.#spells.found,
      stations,
      pattern: this.#pattern.pattern(),
      isComplete: !this.#isCutShort,
      tookMs: performance.now() - this.#startedMs,
    };
  }

  async #station(
    plan: StationDays,
    timeline: NetworkSettings[],
    progress: Progress,
  ): Promise<SearchedStation> {
    const searched = { stationId: plan.station.id, days: 0, daysLeftOut: 0, minutes: 0, alikeMinutes: 0 };
    for (let first = 0; first < plan.days.length; first += DAYS_AT_ONCE) {
      if (this.#mustStop()) break;
      const days = plan.days.slice(first, first + DAYS_AT_ONCE);
      await readDays(plan, days, {
        timeline,
        mayMatch: (outline) => this.#search.mayMatch(outline),
        mayMake: () => !this.#mustStop() && (this.#freshDays += 1) <= MOST_FRESH_DAYS,
        visit: (dayStartSec, outline, trace) => this.#day(searched, dayStartSec, outline, trace),
        onLeftOut: () => (searched.daysLeftOut += 1),
      });
      progress.done += days.length;
      this.watch.onProgress({ ...progress });
    }
    return searched;
  }

  #day(searched: SearchedStation, dayStartSec: number, outline: Uint8Array, trace: DayTrace | null): void {
    const { stationId } = searched;
    const isWanted = this.#wantedOf(stationId, dayStartSec);
    searched.days += 1;
    for (let minute = 0; minute < DAY_MINUTES; minute += 1) {
      const hasSpectrum = outline[minute * OUTLINE_GROUPS] !== 0;
      if (hasSpectrum && (isWanted === null || isWanted(minute))) searched.minutes += 1;
    }
    if (!trace) return;
    this.#search.eachMatch(trace, isWanted, (match) => {
      const startSec = dayStartSec + match.minute * 60;
      searched.alikeMinutes += 1;
      this.#spells.add(stationId, startSec, match);
      this.#pattern.add(this.#civil.at(startSec));
    });
  }

  /** Whether a minute of a day is asked for: in the dates, and not the spectrum itself; null: all of them are, as on most days. */
  #wantedOf(stationId: number, dayStartSec: number): IsWanted | null {
    const { fromSec, toSec, asked, leftOut } = this.task;
    const endSec = dayStartSec + DAY_MINUTES * 60;
    const isApart = (span: { fromSec: number; toSec: number }) =>
      endSec <= span.fromSec || dayStartSec >= span.toSec;
    const isAll =
      fromSec <= dayStartSec &&
      endSec <= toSec &&
      (leftOut === null || isApart(leftOut)) &&
      (asked.stationId !== stationId || isApart(asked));
    if (isAll) return null;
    return (minute) => {
      const sec = dayStartSec + minute * 60;
      if (sec < fromSec || sec >= toSec) return false;
      if (leftOut && sec + 60 > leftOut.fromSec && sec < leftOut.toSec) return false;
      return asked.stationId !== stationId || sec + 60 <= asked.fromSec || sec >= asked.toSec;
    };
  }

  #mustStop(): boolean {
    if (this.watch.isCancelled() || performance.now() - this.#startedMs > this.task.mostMs) {
      this.#isCutShort = true;
    }
    return this.#isCutShort;
  }
}
