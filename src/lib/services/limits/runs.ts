import type { NetworkSettings } from '#db/queries/networks';
import { pickSettings } from '#db/queries/networks';
import { addDays, localDateAt, localMinuteAt, type LocalDate } from '#lib/time/zone';
import type { LimitWindow, WindowRule } from './windows';

/** A window above a limit. */
export interface WindowAbove extends LimitWindow {
  levelDb: number;
  coverage: number;
}

/** Rolling windows above a limit, each beginning one step after the other, from the first one's beginning to the last one's end. */
export interface Run extends LimitWindow {
  loudest: WindowAbove;
}

/** Runs of rolling windows above a limit; `above` in order of time. Of equally loud windows the first is the loudest. */
export function runsOf(above: readonly WindowAbove[], stepSec: number): Run[] {
  const runs: Run[] = [];
  let lastStartSec = NaN;
  for (const window of above) {
    const run = runs.at(-1);
    if (run && window.startSec === lastStartSec + stepSec) {
      run.endSec = window.endSec;
      if (window.levelDb > run.loudest.levelDb) run.loudest = window;
    } else {
      runs.push({ startSec: window.startSec, endSec: window.endSec, loudest: window });
    }
    lastStartSec = window.startSec;
  }
  return runs;
}

/**
 * The date whose windows a rolling window belongs to: that on which its hours began, across midnight too. Runs do not go on from one
 * date to the next: what is loud all week is an exceedance a day.
 */
export function runDateOf(
  { fromMin, toMin }: Pick<WindowRule, 'fromMin' | 'toMin'>,
  startSec: number,
  timeline: NetworkSettings[],
): LocalDate {
  const { timeZone } = pickSettings(timeline, startSec);
  const date = localDateAt(startSec, timeZone);
  const isAcross = fromMin !== null && toMin !== null && toMin < fromMin;
  return isAcross && localMinuteAt(startSec, timeZone) < toMin ? addDays(date, -1) : date;
}
