import type { Connection } from '#db/queries/connection';
import type { NewLimitVersion } from '#db/queries/limits';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import type { TrialCounts } from '#lib/contracts/limitTrial';
import type { LevelSource } from '#lib/services/levels/intervalSums';
import type { Span } from '#lib/services/levels/spans';
import { coversStation } from '#lib/services/limits/force';
import { judgeMeasured, measure, minimumFor, type Judged, type Measured } from '#lib/services/limits/measure';
import { WindowEvidence } from '#lib/services/limits/windowEvidence';
import { GRAIN_SEC } from '#lib/services/limits/grains';
import { runDateOf, runsOf, type WindowAbove } from '#lib/services/limits/runs';
import { windowsOf, type LimitWindow } from '#lib/services/limits/windows';
import { QUARTER_SEC } from '#lib/time/quarters';
import { groupBy } from '../groupBy';
import { partsOf } from './parts';
import { trialQuarters } from './trialQuarters';
import type { TrialSteps } from './trialSteps';
import { WindowSums } from './windowSums';

/** What a limit compares, whoever set it and whenever it holds. */
export type TrialRule = Pick<
  NewLimitVersion,
  | 'metric'
  | 'averaging'
  | 'windowMin'
  | 'stepMin'
  | 'holidays'
  | 'bandFraction'
  | 'bandIndex'
  | 'percent'
  | 'bandToIndex'
  | 'eventTenths'
  | 'eventMinimumSec'
  | 'eventGapSec'
  | 'backgroundFromMin'
  | 'backgroundToMin'
  | 'windRule'
  | 'thresholdTenths'
  | 'weekdays'
  | 'fromMin'
  | 'toMin'
  | 'minimumCoverage'
  | 'stationIds'
>;

/** A window above the limit, or rolling ones that follow one another: with the level and coverage of the loudest. */
export interface CaughtWindow extends LimitWindow {
  stationId: number;
  levelDb: number;
  coverage: number;
}

export interface StationTrial {
  station: StationRow;
  counts: TrialCounts;
  /** In order of time. */
  caught: CaughtWindow[];
}

/** What a limit is tried on. */
export interface TrialGround {
  stations: readonly StationRow[];
  /** The network's settings in order of their beginning. */
  timeline: NetworkSettings[];
  /** Named dates of the network. */
  holidayDates?: ReadonlySet<string>;
  /** Windows that begin in it are tried. */
  period: Span;
  nowSec: number;
  /** Told how far it is; left out: nobody is. */
  steps?: TrialSteps;
}

const NO_DATES: ReadonlySet<string> = new Set();

interface TriedWindow extends LimitWindow {
  lengthSec: number;
  minimumCoverage: number | null;
}

/** Judges every closed window of a rule that begins within a period, as the worker would: station by station. */
export async function tryRule(
  rule: TrialRule,
  ground: TrialGround,
  conn: Connection,
): Promise<StationTrial[]> {
  const { timeline, period, steps } = ground;
  const windows = closedWindows(rule, ground);
  const tried: StationTrial[] = [];
  for (const station of ground.stations.filter(({ id }) => coversStation(rule, id))) {
    const source = { station, timeline, validity: 'rules' as const };
    const count = new StationCount(rule, windows.length);
    await measureEach(rule, source, windows, conn, (window, came) => {
      count.add(window, came);
      steps?.reach(daysOf({ fromSec: period.fromSec, toSec: window.startSec }));
    });
    steps?.finish(daysOf(period));
    tried.push(count.trial(station, timeline));
  }
  return tried;
}

/** Length of a period in days of 24 hours. */
export function daysOf({ fromSec, toSec }: Span): number {
  return (toSec - fromSec) / 86_400;
}

/** Tells what every window came to, in their order: from parts read at once, where these tell it. */
async function measureEach(
  rule: TrialRule,
  source: LevelSource,
  windows: readonly TriedWindow[],
  conn: Connection,
  tell: (window: TriedWindow, came: Measured) => void,
): Promise<void> {
  const parts = partsOf(rule);
  if (parts === null) {
    const evidence = new WindowEvidence(source, conn);
    for (const window of windows)
      tell(window, await evidence.measure(rule, { fromSec: window.startSec, toSec: window.endSec }));
    return;
  }
  const { windRule: wind = null } = rule;
  const partSec = wind ? GRAIN_SEC : partSecOf(windows);
  for (const some of chunksOf(windows, partSec === QUARTER_SEC ? CHUNK_SEC : FINE_CHUNK_SEC)) {
    const read = await trialQuarters(
      { ...source, wind },
      spanOf(some),
      { parts, partSec, bands: rule },
      conn,
    );
    const sums = new WindowSums(read, { parts, partSec });
    for (const window of some) tell(window, measure(rule, sums.of(window)));
  }
}

function spanOf(windows: readonly TriedWindow[]): Span {
  let [fromSec, toSec] = [Infinity, -Infinity];
  for (const { startSec, endSec } of windows) {
    fromSec = Math.min(fromSec, startSec);
    toSec = Math.max(toSec, endSec);
  }
  return { fromSec, toSec };
}

/** Windows that begin within so long of each other are measured from what is read at once: the next ones' parts take its memory. */
const CHUNK_SEC = 31 * 86_400;
/** The same of fives of minutes, that hold their distributions. */
const FINE_CHUNK_SEC = 7 * 86_400;

function* chunksOf(windows: readonly TriedWindow[], chunkSec: number): Generator<TriedWindow[]> {
  let chunk: TriedWindow[] = [];
  for (const window of windows) {
    if (window.startSec >= (chunk[0]?.startSec ?? Infinity) + chunkSec) {
      yield chunk;
      chunk = [];
    }
    chunk.push(window);
  }
  if (chunk.length > 0) yield chunk;
}

function closedWindows(
  rule: TrialRule,
  { timeline, period, nowSec, holidayDates = NO_DATES }: TrialGround,
): TriedWindow[] {
  const always = {
    ...rule,
    windowMin: rule.windowMin ?? null,
    stepMin: rule.stepMin ?? null,
    holidays: rule.holidays ?? 'as-weekday',
    holidayDates,
    effectiveFromSec: 0,
    withdrawnAt: null,
  };
  return windowsOf(always, period.fromSec, period.toSec, timeline)
    .filter(({ endSec }) => endSec <= nowSec)
    .map((window) => ({
      ...window,
      lengthSec: window.endSec - window.startSec,
      minimumCoverage: minimumFor(rule, pickSettings(timeline, window.startSec)),
    }));
}

/** What windows are made of: quarter-hours where all of them are whole numbers of these, else fives of minutes. */
function partSecOf(windows: readonly LimitWindow[]): number {
  const isOfQuarters = windows.every(
    ({ startSec, endSec }) => startSec % QUARTER_SEC === 0 && endSec % QUARTER_SEC === 0,
  );
  return isOfQuarters ? QUARTER_SEC : GRAIN_SEC;
}

/** Counts the windows of a station as they are measured, in order of time. */
class StationCount {
  readonly #counts: TrialCounts;
  readonly #above: WindowAbove[] = [];

  constructor(
    private readonly rule: TrialRule,
    windows: number,
  ) {
    this.#counts = { windows, compared: 0, uncovered: 0, empty: 0, dismissed: 0, caught: 0 };
  }

  add(window: TriedWindow, came: Measured): void {
    const judged = judgeMeasured(this.rule, window, came);
    this.#counts[placeOf(this.rule, judged)] += 1;
    const { levelDb, coverage, isExceeded } = judged;
    if (!isExceeded || levelDb === null) return;
    this.#above.push({ startSec: window.startSec, endSec: window.endSec, levelDb, coverage });
  }

  trial(station: StationRow, timeline: NetworkSettings[]): StationTrial {
    const caught = caughtOf(this.rule, this.#above, timeline).map(
      ({ startSec, endSec, levelDb, coverage }) => ({
        startSec,
        endSec,
        levelDb,
        coverage,
        stationId: station.id,
      }),
    );
    return { station, counts: { ...this.#counts, caught: caught.length }, caught };
  }
}

/** Where a window is counted. One without an event is compared like any other: it has none that is too loud. */
function placeOf({ metric }: TrialRule, judged: Judged): 'compared' | 'uncovered' | 'empty' | 'dismissed' {
  const isWithoutEvent = metric === 'eventLAE' && judged.validSec > 0;
  if (judged.levelDb === null && !isWithoutEvent) return 'empty';
  if (judged.isDismissed) return 'dismissed';
  return judged.isCovered ? 'compared' : 'uncovered';
}

/** Windows above the limit as the judge would list them: rolling ones that follow one another on a date as one. */
function caughtOf(
  { stepMin = null, fromMin, toMin }: TrialRule,
  above: readonly WindowAbove[],
  timeline: NetworkSettings[],
): readonly WindowAbove[] {
  if (stepMin === null) return above;
  const byDate = groupBy(above, ({ startSec }) => runDateOf({ fromMin, toMin }, startSec, timeline));
  return [...byDate.values()].flatMap((ofDate) =>
    runsOf(ofDate, stepMin * 60).map(({ startSec, endSec, loudest }) => ({ ...loudest, startSec, endSec })),
  );
}
