import { inTransaction } from '#db/queries/connection';
import { findSelfCheck, insertSelfCheck } from '#db/queries/selfChecks';
import { lockStation } from '#db/queries/stations';
import { toCentiDb } from '#lib/acoustics/rounding';
import { type SelfCheckReceipt, type SelfChecks } from '#lib/contracts/drift';

const MOST_AHEAD_SEC = 300;

/** Keeps self-checks of a station: durable when the promise resolves. One that is stored already is known, one that differs refused. */
export async function takeSelfChecks(
  stationId: number,
  { checks }: SelfChecks,
  now: Date,
): Promise<SelfCheckReceipt> {
  const nowSec = Math.floor(now.getTime() / 1000);
  return inTransaction(async (transaction) => {
    await lockStation(stationId, transaction);
    const receipt: SelfCheckReceipt = { accepted: 0, known: 0, refused: [], serverTime: now.toISOString() };
    for (const [index, { at, level, nominal }] of checks.entries()) {
      const check = { checkedAtSec: at, levelCentiDb: toCentiDb(level), nominalCentiDb: toCentiDb(nominal) };
      if (at > nowSec + MOST_AHEAD_SEC) {
        const detail = 'The check lies after the server’s time; the monitor’s clock is ahead.';
        receipt.refused.push({ index, code: 'clock-ahead', detail });
        continue;
      }
      const stored = await findSelfCheck(stationId, at, transaction);
      if (!stored) {
        await insertSelfCheck(stationId, check, nowSec, transaction);
        receipt.accepted += 1;
      } else if (
        stored.levelCentiDb === check.levelCentiDb &&
        stored.nominalCentiDb === check.nominalCentiDb
      ) {
        receipt.known += 1;
      } else {
        const detail = 'Another check of this time is stored; it stays.';
        receipt.refused.push({ index, code: 'conflict', detail });
      }
    }
    return receipt;
  });
}
