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
  const { timeline } = ground;
  const windows = closedWindows(rule, ground);
  const tried: StationTrial[] = [];
  for (const station of ground.stations.filter(({ id }) => coversStation(rule, id))) {
    const source = { station, timeline, validity: 'rules' as const };
    tried.push(tryStation(rule, station, windows, await measuredAll(rule, source, windows, conn), timeline));
  }
  return tried;
}

/** What every window came to, beside the windows: from parts read at once, where these tell it. */
async function measuredAll(
  rule: TrialRule,
  source: LevelSource,
  windows: readonly TriedWindow[],
  conn: Connection,
): Promise<Measured[]> {
  const [first, last] = [windows[0], windows.at(-1)];
  if (!first || !last) return [];
  const parts = partsOf(rule);
  if (parts === null) {
    const evidence = new WindowEvidence(source, conn);
    const measured: Measured[] = [];
    for (const { startSec, endSec } of windows)
      measured.push(await evidence.measure(rule, { fromSec: startSec, toSec: endSec }));
    return measured;
  }
  const partSec = partSecOf(windows);
  const span = { fromSec: first.startSec, toSec: last.endSec };
  const sums = new WindowSums(await trialQuarters(source, span, { parts, partSec, bands: rule }, conn), {
    parts,
    partSec,
  });
  return windows.map((window) => measure(rule, sums.of(window)));
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

function tryStation(
  rule: TrialRule,
  station: StationRow,
  windows: readonly TriedWindow[],
  measured: readonly Measured[],
  timeline: NetworkSettings[],
): StationTrial {
  const counts: TrialCounts = {
    windows: windows.length,
    compared: 0,
    uncovered: 0,
    empty: 0,
    dismissed: 0,
    caught: 0,
  };
  const above: WindowAbove[] = [];
  for (const [at, window] of windows.entries()) {
    const came = measured[at] ?? { levelDb: null, validSec: 0 };
    const judged = judgeMeasured(rule, window, came);
    const { levelDb, coverage, isExceeded } = judged;
    counts[placeOf(rule, judged)] += 1;
    if (!isExceeded || levelDb === null) continue;
    const { startSec, endSec } = window;
    above.push({ startSec, endSec, levelDb, coverage });
  }
  const caught = caughtOf(rule, above, timeline).map((one) => ({ ...one, stationId: station.id }));
  counts.caught = caught.length;
  return { station, counts, caught };
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
): WindowAbove[] {
  if (stepMin === null) return [...above];
  const byDate = groupBy(above, ({ startSec }) => runDateOf({ fromMin, toMin }, startSec, timeline));
  return [...byDate.values()].flatMap((ofDate) =>
    runsOf(ofDate, stepMin * 60).map(({ startSec, endSec, loudest }) => ({ ...loudest, startSec, endSec })),
  );
}
