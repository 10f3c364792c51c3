import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findCalibration } from '#db/queries/calibrations';
import { setDoubtDecision } from '#db/queries/doubtDecisions';
import { lockInstrument } from '#db/queries/instruments';
import { type Doubt, type DoubtDecision } from '#lib/contracts/calibrations';
import { formatInstantUtc } from '#lib/contracts/common';
import { exclude } from '../exclusions/add';
import { SEES_COMMITTED } from '../instruments/deploy';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { NO_CHECK } from './add';
import { doubtJson, doubtsOf } from './doubts';

/**
 * Keeps or excludes a doubtful stretch, as an operator decides: with its exclusion, all of it or nothing. Whoever thinks better
 * of an exclusion withdraws it, and the stretch waits again.
 */
export function decideDoubt(
  { networkId, userId }: { networkId: number; userId: string },
  { calibration, station, from, decision, reason }: DoubtDecision,
): Promise<Outcome<Doubt>> {
  return inTransaction<Outcome<Doubt>>(async (transaction) => {
    const check = await findCalibration(networkId, calibration, transaction);
    if (!check) return NO_CHECK;
    await lockInstrument(check.instrumentId, transaction);
    const isMeant = (one: { check: { id: number }; stationCode: string; fromSec: number }) =>
      one.check.id === calibration &&
      one.stationCode.toUpperCase() === station.toUpperCase() &&
      one.fromSec === from;
    const doubt = (await doubtsOf(networkId, transaction)).find(isMeant);
    if (!doubt) return unknown('This stretch is not doubtful, or no longer: look at the list again.');
    const { stationId, stationCode, fromSec, toSec } = doubt;
    if (toSec === null) {
      return invalid('decision', 'waits until the instrument has been checked again or taken down');
    }
    if (doubt.decision?.decision === 'exclude') {
      const detail = 'This stretch is excluded already; withdraw that exclusion first.';
      return { kind: 'before', code: 'excluded-before', detail };
    }
    const span = { networkId, fromSec, toSec, reason, userId };
    const exclusion =
      decision === 'exclude' ? await exclude({ id: stationId, code: stationCode }, span, transaction) : null;
    await setDoubtDecision(
      {
        calibrationId: calibration,
        stationId,
        startSec: fromSec,
        endSec: toSec,
        decision,
        exclusionId: exclusion?.id ?? null,
        reason,
        decidedBy: userId,
      },
      transaction,
    );
    const stretch = { from: formatInstantUtc(fromSec), to: formatInstantUtc(toSec) };
    await appendAudit(
      {
        userId,
        networkId,
        action: `doubt.${decision}`,
        subject: `station ${stationCode}`,
        detail: { calibration, ...stretch, exclusion: exclusion?.id ?? null, reason },
      },
      transaction,
    );
    const decided = (await doubtsOf(networkId, transaction)).find(isMeant);
    if (!decided) throw new Error('The stretch just decided cannot be read.');
    return done(doubtJson(decided));
  }, SEES_COMMITTED);
}
