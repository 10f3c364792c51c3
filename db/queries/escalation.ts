import { pool, type Connection } from './connection';
import { LONGEST_EXCEEDANCE_SEC } from './judgedExceedances';

/** Who is told when nobody has acknowledged an exceedance for some minutes. */
export interface EscalationStep {
  /** 1, 2, … */
  step: number;
  afterMin: number;
  userIds: string[];
  changedAt: Date;
}

/** A network's steps in their order. */
export async function listEscalationSteps(
  networkId: number,
  conn: Connection = pool(),
): Promise<EscalationStep[]> {
  const rows: (Omit<EscalationStep, 'userIds'> & { userIds: unknown })[] = await conn('escalation_steps')
    .where({ network_id: networkId })
    .orderBy('step')
    .select({ step: 'step', afterMin: 'after_min', userIds: 'user_ids', changedAt: 'changed_at' });
  return rows.map((row) => ({
    ...row,
    userIds: (typeof row.userIds === 'string' ? JSON.parse(row.userIds) : row.userIds) as string[],
  }));
}

/** Networks that have steps. */
export async function listEscalatingNetworks(conn: Connection = pool()): Promise<number[]> {
  return conn('escalation_steps').distinct('network_id').orderBy('network_id').pluck('network_id');
}

/** Puts steps in the place of those set before. */
export async function setEscalationSteps(
  networkId: number,
  steps: readonly Omit<EscalationStep, 'changedAt'>[],
  changedBy: string,
  transaction: Connection,
): Promise<void> {
  await transaction('escalation_steps').where({ network_id: networkId }).delete();
  if (steps.length === 0) return;
  const changedAt = new Date();
  await transaction('escalation_steps').insert(
    steps.map(({ step, afterMin, userIds }) => ({
      network_id: networkId,
      step,
      after_min: afterMin,
      user_ids: JSON.stringify(userIds),
      changed_by: changedBy,
      changed_at: changedAt,
    })),
  );
}

/** When exceedances were found (`from <= t <= to`) and how long after its window one may have been found. */
export interface EscalationSpan {
  from: Date;
  to: Date;
  withinSec: number;
}

/** Exceedances of a network that stand, were found within a span, and that nobody has acknowledged, first found first. */
export async function listUnacknowledged(
  networkId: number,
  { from, to, withinSec }: EscalationSpan,
  conn: Connection = pool(),
): Promise<number[]> {
  return (
    conn('exceedances')
      .where({ network_id: networkId, state: 'standing', acknowledged_at: null })
      // The key on the beginning bounds what is read.
      .where('starts_at', '>', Math.floor(from.getTime() / 1000) - LONGEST_EXCEEDANCE_SEC - withinSec)
      .whereBetween('detected_at', [from, to])
      .whereRaw('UNIX_TIMESTAMP(detected_at) - ends_at <= ?', [withinSec])
      .orderBy(['detected_at', 'id'])
      .pluck('id')
  );
}
