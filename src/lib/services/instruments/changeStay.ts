import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  endDeploymentAt,
  findDeployment,
  withdrawDeployment,
  type DeploymentRow,
} from '#db/queries/deployments';
import { findInstrument, lockInstrument } from '#db/queries/instruments';
import { lockStation } from '#db/queries/stations';
import { type Deployment } from '#lib/contracts/instruments';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { NO_INSTRUMENT } from './add';
import { aheadOf, overlapOf, readDeployment, SEES_COMMITTED, stayWords } from './deploy';
import { deploymentJson } from './instrumentJson';

export interface StayAct {
  networkId: number;
  instrumentId: number;
  deploymentId: number;
  userId: string;
  nowSec: number;
}

const WITHDRAWN_BEFORE: Outcome<never> = {
  kind: 'before',
  code: 'withdrawn-before',
  detail: 'Somebody has withdrawn this stay already.',
};

/** Says until when (epoch seconds, exclusive) an instrument stood at a station; a wrong end can be put right so, too. */
export function endStay(act: StayAct, endSec: number): Promise<Outcome<Deployment>> {
  return onStay(act, async (stay, transaction) => {
    if (endSec <= stay.startSec) return invalid('to', 'must be after the beginning of the stay');
    const ended = { ...stay, endSec };
    const problem = aheadOf(ended, act.nowSec) ?? (await overlapOf(ended, stay.id, transaction));
    if (problem) return inField(problem, 'to');
    await endDeploymentAt(stay.id, endSec, transaction);
    await noteStay(
      act,
      stay,
      'deployment.end',
      { before: stayWords(stay), after: stayWords(ended) },
      transaction,
    );
    return done(deploymentJson(ended));
  });
}

/** Withdraws a stay that was noted by mistake: no figure was measured by it. It is kept, with the reason. */
export function withdrawStay(act: StayAct, reason: string): Promise<Outcome<Deployment>> {
  return onStay(act, async (stay, transaction) => {
    await withdrawDeployment(stay.id, { by: act.userId, reason }, transaction);
    await noteStay(act, stay, 'deployment.withdraw', { ...stayWords(stay), reason }, transaction);
    return done(deploymentJson(await readDeployment(act.instrumentId, stay.id, transaction)));
  });
}

/** Works on a stay that stands, with its instrument and station locked. */
function onStay(
  { networkId, instrumentId, deploymentId }: StayAct,
  work: (stay: DeploymentRow, transaction: Connection) => Promise<Outcome<Deployment>>,
): Promise<Outcome<Deployment>> {
  return inTransaction<Outcome<Deployment>>(async (transaction) => {
    await lockInstrument(instrumentId, transaction);
    if (!(await findInstrument(networkId, instrumentId, transaction))) return NO_INSTRUMENT;
    const stay = await findDeployment(instrumentId, deploymentId, transaction);
    if (!stay) return unknown('The instrument has no stay with this number.');
    if (stay.withdrawnAt) return WITHDRAWN_BEFORE;
    await lockStation(stay.stationId, transaction);
    return work(stay, transaction);
  }, SEES_COMMITTED);
}

function noteStay(
  { networkId, userId }: StayAct,
  stay: DeploymentRow,
  action: string,
  detail: Record<string, unknown>,
  transaction: Connection,
): Promise<void> {
  return appendAudit(
    {
      userId,
      networkId,
      action,
      subject: `instrument ${stay.serialNumber}`,
      detail: { deployment: stay.id, station: stay.stationCode, ...detail },
    },
    transaction,
  );
}

function inField(outcome: Outcome<never>, field: string): Outcome<never> {
  if (outcome.kind !== 'invalid') return outcome;
  return { kind: 'invalid', problems: outcome.problems.map(({ message }) => ({ field, message })) };
}
