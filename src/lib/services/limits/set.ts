import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { findLimit, insertLimit, insertVersion, lockLimits, withdrawLimit } from '#db/queries/limits';
import { settingsAt } from '#db/queries/networks';
import { listStationGroups, lockStationGroups } from '#db/queries/stationGroups';
import { listStations } from '#db/queries/stations';
import { formatInstantUtc } from '#lib/contracts/common';
import type { Limit, NewLimit } from '#lib/contracts/limits';
import { readLimit } from './list';
import { pendLimit } from './pendLimit';
import { readRule, type FieldProblem, type LimitRule, type ReadRule } from './rule';

/** Who sets limits where. */
export interface LimitSetter {
  userId: string;
  networkId: number;
}

export type SetOutcome =
  | { kind: 'set'; limit: Limit }
  | { kind: 'invalid'; problems: FieldProblem[] }
  | { kind: 'unknown' }
  | { kind: 'withdrawn-before' }
  | { kind: 'changed-before' };

/** So that each transaction sees what those before it committed, once it holds the locks. */
const ISOLATION = { isolationLevel: 'read committed' } as const;

/** Sets a limit. Windows that begin from its beginning on are judged by it, those of the past too. */
export async function addLimit(setter: LimitSetter, limit: NewLimit): Promise<SetOutcome> {
  return inTransaction<SetOutcome>(async (transaction) => {
    const read = await ruleOf(setter, limit, transaction);
    if (!read.isValid) return { kind: 'invalid', problems: read.problems };
    const version = { ...read.version, createdBy: setter.userId };
    const limitId = await insertLimit(setter.networkId, version, transaction);
    await pendLimit(setter.networkId, limitId, version.effectiveFromSec, transaction);
    return audited('limit.add', setter, limitId, { version: 1, ...detailOf(read.version) }, transaction);
  }, ISOLATION);
}

/**
 * Changes a limit by a new version. Past exceedances keep theirs, unless the new one begins before them. `basedOn`: the newest
 * version that the person saw; where there is a newer one by now, nothing is changed.
 */
export async function reviseLimit(
  setter: LimitSetter,
  limitId: number,
  limit: NewLimit,
  basedOn: number | null = null,
): Promise<SetOutcome> {
  return inTransaction<SetOutcome>(async (transaction) => {
    const read = await ruleOf(setter, limit, transaction);
    if (!read.isValid) return { kind: 'invalid', problems: read.problems };
    await lockLimits([limitId], transaction);
    const last = (await findLimit(setter.networkId, limitId, transaction)).at(-1);
    if (!last) return { kind: 'unknown' };
    if (last.withdrawnAt) return { kind: 'withdrawn-before' };
    if (basedOn !== null && basedOn !== last.version) return { kind: 'changed-before' };
    const number = last.version + 1;
    const version = { ...read.version, createdBy: setter.userId };
    await insertVersion(limitId, number, version, transaction);
    await pendLimit(setter.networkId, limitId, version.effectiveFromSec, transaction);
    return audited(
      'limit.revise',
      setter,
      limitId,
      { version: number, ...detailOf(read.version) },
      transaction,
    );
  }, ISOLATION);
}

/** Withdraws a limit: windows that begin from now on are not judged by it. Nothing is deleted. */
export async function endLimit(setter: LimitSetter, limitId: number, reason: string): Promise<SetOutcome> {
  return inTransaction<SetOutcome>(async (transaction) => {
    await lockLimits([limitId], transaction);
    const versions = await findLimit(setter.networkId, limitId, transaction);
    if (versions.length === 0) return { kind: 'unknown' };
    const isWithdrawn = await withdrawLimit(limitId, { by: setter.userId, reason }, transaction);
    if (!isWithdrawn) return { kind: 'withdrawn-before' };
    return audited('limit.withdraw', setter, limitId, { reason }, transaction);
  }, ISOLATION);
}

/** The rule to be set. Holds the network's groups: their stations stay as it has them until it is stored. */
async function ruleOf(
  { networkId }: LimitSetter,
  limit: NewLimit,
  transaction: Connection,
): Promise<ReadRule> {
  const nowSec = Math.floor(Date.now() / 1000);
  const { scheme } = await settingsAt(networkId, nowSec, transaction);
  if (limit.window === 'evening' && scheme.eveningStartMin === null) {
    const message = 'must be another one: this network has no evening';
    return { isValid: false, problems: [{ field: 'window', message }] };
  }
  await lockStationGroups(networkId, transaction);
  const places = {
    stations: await listStations(networkId, transaction),
    groups: await listStationGroups(networkId, transaction),
  };
  return readRule(limit, places, nowSec);
}

async function audited(
  action: string,
  { userId, networkId }: LimitSetter,
  limitId: number,
  detail: Record<string, unknown>,
  transaction: Connection,
): Promise<SetOutcome> {
  await appendAudit({ userId, networkId, action, subject: `limit ${limitId}`, detail }, transaction);
  const found = await readLimit(networkId, limitId, true, transaction);
  if (!found) throw new Error(`There is no limit ${limitId} in network ${networkId}.`);
  return { kind: 'set', limit: found.limit };
}

/** What the audit trail keeps of a version: of addresses only how many there are. */
function detailOf({ recipients, effectiveFromSec, ...rule }: LimitRule) {
  return { ...rule, effectiveFrom: formatInstantUtc(effectiveFromSec), recipients: recipients.length };
}
