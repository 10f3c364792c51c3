import type { Connection } from '#db/queries/connection';
import type { LimitVersion } from '#db/queries/limits';
import { pickSettings, type NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import type { TrialCounts } from '#lib/contracts/limitTrial';
import type { Span } from '#lib/services/levels/spans';
import { coversStation } from '#lib/services/limits/force';
import { judgeWindow, minimumFor } from '#lib/services/limits/measure';
import { windowsOf, type LimitWindow } from '#lib/services/limits/windows';
import { trialQuarters, type TrialQuarter } from './trialQuarters';
import { WindowSums } from './windowSums';

/** What a limit compares, whoever set it and whenever it holds. */
export type TrialRule = Pick<
  LimitVersion,
  | 'metric'
  | 'averaging'
  | 'bandFraction'
  | 'bandIndex'
  | 'thresholdTenths'
  | 'weekdays'
  | 'fromMin'
  | 'toMin'
  | 'minimumCoverage'
  | 'stationIds'
>;

/** A window above the limit. */
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
  /** Windows that begin in it are tried. */
  period: Span;
  nowSec: number;
}

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
  const [first, last] = [windows[0], windows.at(-1)];
  const tried: StationTrial[] = [];
  for (const station of ground.stations.filter(({ id }) => coversStation(rule, id))) {
    const source = { station, timeline, validity: 'rules' as const };
    const quarters =
      first && last
        ? await trialQuarters(
            source,
            { fromSec: first.startSec, toSec: last.endSec },
            { bands: rule.metric === 'bandLeq' },
            conn,
          )
        : [];
    tried.push(tryStation(rule, station, windows, quarters));
  }
  return tried;
}

function closedWindows(rule: TrialRule, { timeline, period, nowSec }: TrialGround): TriedWindow[] {
  const always = { ...rule, effectiveFromSec: 0, withdrawnAt: null };
  return windowsOf(always, period.fromSec, period.toSec, timeline)
    .filter(({ endSec }) => endSec <= nowSec)
    .map((window) => ({
      ...window,
      lengthSec: window.endSec - window.startSec,
      minimumCoverage: minimumFor(rule, pickSettings(timeline, window.startSec)),
    }));
}

function tryStation(
  rule: TrialRule,
  station: StationRow,
  windows: readonly TriedWindow[],
  quarters: readonly TrialQuarter[],
): StationTrial {
  const sums = new WindowSums(quarters);
  const counts: TrialCounts = { windows: windows.length, compared: 0, uncovered: 0, empty: 0, caught: 0 };
  const caught: CaughtWindow[] = [];
  for (const window of windows) {
    const { levelDb, coverage, isCovered, isExceeded } = judgeWindow(rule, window, sums.of(window));
    if (levelDb === null) counts.empty += 1;
    else if (isCovered) counts.compared += 1;
    else counts.uncovered += 1;
    if (!isExceeded || levelDb === null) continue;
    const { startSec, endSec } = window;
    caught.push({ stationId: station.id, startSec, endSec, levelDb, coverage });
  }
  counts.caught = caught.length;
  return { station, counts, caught };
}
