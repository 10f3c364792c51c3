import { markUncomputedPeriod } from '#db/queries/dayPeriods';
import { listNetworks, listSettings } from '#db/queries/networks';
import { periodsTouching } from '#lib/services/levels/datePeriods';
import { eachAlone, networkSubject } from '../jobs/alone';

/** How long ago periods may have ended that are looked for. */
const LOOK_BACK_SEC = 3 * 86_400;

/**
 * Marks the last quarter-hour of days, evenings and nights that have ended, have data and no row: all their marks were
 * recomputed while they ran. Figures are right without a row, but dearer. Safe to run twice, late, or on two machines.
 */
export async function completePeriods(now: Date): Promise<number> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const complete = async ({ id }: { id: number }) => {
    let marks = 0;
    const timeline = await listSettings(id);
    for (const period of periodsTouching(nowSec - LOOK_BACK_SEC, nowSec, timeline)) {
      if (period.toSec <= nowSec) marks += await markUncomputedPeriod(id, period);
    }
    return marks;
  };
  return eachAlone('complete-periods', await listNetworks(), networkSubject, complete, now);
}
