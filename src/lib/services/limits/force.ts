import type { LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import { groupBy } from '../groupBy';
import { runDateOf } from './runs';
import { windowsOf, type LimitWindow } from './windows';

/** A window of a limit with the version that judges it. */
export interface JudgedWindow extends LimitWindow {
  version: LimitVersion;
}

/** The longest window, a day of 25 h where the clock is put back, with room. */
export const LONGEST_WINDOW_SEC = 26 * 3600;

/** The versions of each limit, by its id, in their order. */
export function byLimit<V extends LimitVersion>(versions: Iterable<V>): Map<number, V[]> {
  return groupBy(versions, ({ limitId }) => limitId);
}

/** When a later version of the same limit takes the place of a version, epoch seconds; Infinity where none does. */
export function replacedFromSec(version: LimitVersion, ofLimit: readonly LimitVersion[]): number {
  const later = ofLimit.filter((other) => other.version > version.version);
  return Math.min(Infinity, ...later.map(({ effectiveFromSec }) => effectiveFromSec));
}

/** The version of one limit that judges what begins at an instant: of those in force by then the newest. */
export function versionAt<V extends LimitVersion>(ofLimit: readonly V[], atSec: number): V | undefined {
  return ofLimit.findLast(({ effectiveFromSec }) => effectiveFromSec <= atSec);
}

/**
 * Windows that are enough to have all of them judged: rolling ones of a date are judged together, so of those that have ended the last
 * one stands for its date.
 */
export function enoughToJudge(
  windows: readonly JudgedWindow[],
  nowSec: number,
  timeline: NetworkSettings[],
): JudgedWindow[] {
  const enough = new Map<string, JudgedWindow>();
  for (const window of windows) {
    const { version, startSec, endSec } = window;
    const isOne = version.stepMin !== null && endSec <= nowSec;
    const key = isOne
      ? `${version.id} ${runDateOf(version, startSec, timeline)}`
      : `${version.id}:${startSec}`;
    enough.set(key, window);
  }
  return [...enough.values()];
}

/** Whether a version holds for a station. */
export function coversStation({ stationIds }: Pick<LimitVersion, 'stationIds'>, stationId: number): boolean {
  return stationIds === null || stationIds.includes(stationId);
}

/**
 * Windows of one limit at a station that begin in `fromSec <= t < toSec`, each with the version that judges it.
 * `ofLimit`: the limit's versions in their order; `timeline`: the network's settings in order of their beginning.
 */
export function judgedWindows(
  ofLimit: readonly LimitVersion[],
  stationId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  timeline: NetworkSettings[],
): JudgedWindow[] {
  return ofLimit
    .filter((version) => coversStation(version, stationId))
    .flatMap((version) => {
      const first = Math.max(fromSec, version.effectiveFromSec);
      const end = Math.min(toSec, replacedFromSec(version, ofLimit));
      if (first >= end) return [];
      return windowsOf(version, first, end, timeline).map((window) => ({ ...window, version }));
    });
}
