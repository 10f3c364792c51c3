import { takeSelfChecks } from '#lib/services/drift/selfChecks';
import { formatInstantUtc } from '#lib/contracts/common';
import { MOST_SELF_CHECKS, selfChecksSchema } from '#lib/contracts/drift';
import type { DemoStation } from './stations';

const DAY_SEC = 86_400;
const NOMINAL_DB = 94;
/** Monitors that have a source of their own, and by how many dB a day each goes off. */
const DRIFTS_DB: Record<string, number> = { 'MER-01': 0, 'MER-02': 0.001, 'MER-04': -0.012 };

/** Posts a self-check a night for some stations. @returns how many. */
export async function seedSelfChecks(
  stations: readonly DemoStation[],
  nowSec: number,
  historyDays: number,
): Promise<number> {
  let count = 0;
  const days = Math.min(historyDays, MOST_SELF_CHECKS);
  const firstSec = Math.floor(nowSec / DAY_SEC) * DAY_SEC + 2 * 3600 - days * DAY_SEC;
  for (const { site, station } of stations) {
    const driftDb = DRIFTS_DB[site.code];
    if (driftDb === undefined) continue;
    const checks = Array.from({ length: days }, (_, day) => ({
      at: formatInstantUtc(firstSec + day * DAY_SEC),
      level: NOMINAL_DB + driftDb * day + (((day * 37) % 7) - 3) / 50,
      nominal: NOMINAL_DB,
    }));
    const receipt = await takeSelfChecks(
      station.id,
      selfChecksSchema.parse({ checks }),
      new Date(nowSec * 1000),
    );
    count += receipt.accepted;
  }
  return count;
}
