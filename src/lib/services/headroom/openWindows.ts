import type { LimitVersion } from '#db/queries/limits';
import type { NetworkSettings } from '#db/queries/networks';
import { byLimit, judgedWindows, LONGEST_WINDOW_SEC, type JudgedWindow } from '#lib/services/limits/force';

/**
 * Windows of a network's limits at a station that are open at an instant, `startSec <= now < endSec`, each with the version that
 * will judge it; the one that ends first first. `versions`: of all limits; `timeline`: the network's settings in their order.
 */
export function openWindows(
  versions: readonly LimitVersion[],
  stationId: number,
  nowSec: number,
  timeline: NetworkSettings[],
): JudgedWindow[] {
  const begun = { fromSec: nowSec - LONGEST_WINDOW_SEC, toSec: nowSec + 1 };
  return [...byLimit(versions).values()]
    .flatMap((ofLimit) => {
      const open = judgedWindows(ofLimit, stationId, begun, timeline).filter(
        ({ startSec, endSec }) => startSec <= nowSec && nowSec < endSec,
      );
      // Of rolling windows many are open: the first that ends stands for them.
      return open.filter(({ version }, at) => version.stepMin === null || at === 0);
    })
    .sort((a, b) => a.endSec - b.endSec || a.version.name.localeCompare(b.version.name, 'en'));
}
