import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { listDeploymentsOf } from '#db/queries/deployments';
import {
  findInstrument,
  lockInstrument,
  updateInstrument,
  type InstrumentDetails,
  type InstrumentRow,
} from '#db/queries/instruments';
import { type Instrument, type InstrumentChanges } from '#lib/contracts/instruments';
import { isDuplicateKey } from '../duplicateKey';
import { done, invalid, type Outcome } from '../outcome';
import { NO_INSTRUMENT, SERIAL_TAKEN } from './add';
import { SEES_COMMITTED } from './deploy';
import { instrumentJson } from './instrumentJson';

type Row = Partial<InstrumentDetails & Pick<InstrumentRow, 'retiredAt'>>;

interface Act {
  networkId: number;
  id: number;
  userId: string;
  nowSec: number;
}

/** Changes what was given and leaves the rest. An instrument that stands at a station cannot be retired. */
export async function changeInstrument(act: Act, changes: InstrumentChanges): Promise<Outcome<Instrument>> {
  try {
    return await inTransaction((transaction) => change(act, changes, transaction), SEES_COMMITTED);
  } catch (error) {
    if (isDuplicateKey(error)) return SERIAL_TAKEN;
    throw error;
  }
}

async function change(
  { networkId, id, userId, nowSec }: Act,
  { retired, reason, ...details }: InstrumentChanges,
  transaction: Connection,
): Promise<Outcome<Instrument>> {
  await lockInstrument(id, transaction);
  const before = await findInstrument(networkId, id, transaction);
  if (!before) return NO_INSTRUMENT;
  const deployments = await listDeploymentsOf(id, transaction);
  const standing = deployments.find(
    ({ withdrawnAt, endSec }) => withdrawnAt === null && (endSec === null || endSec > nowSec),
  );
  if (retired && standing) {
    return invalid('retired', `it stands at station ${standing.stationCode}: end that stay first`);
  }
  const after = differing(before, {
    ...details,
    retiredAt: retired === undefined ? undefined : retired ? (before.retiredAt ?? new Date()) : null,
  });
  if (Object.keys(after).length > 0) {
    await updateInstrument(id, after, transaction);
    const action = retirementOf(after) ?? 'instrument.change';
    const was = Object.fromEntries(Object.keys(after).map((key) => [key, before[key as keyof Row]]));
    const detail = { before: was, after, ...(reason !== undefined && { reason }) };
    const subject = `instrument ${before.serialNumber}`;
    await appendAudit({ userId, networkId, action, subject, detail }, transaction);
  }
  return done(instrumentJson({ ...before, ...after }, deployments, nowSec));
}

function retirementOf({ retiredAt }: Row): string | null {
  if (retiredAt === undefined) return null;
  return retiredAt ? 'instrument.retire' : 'instrument.bring-back';
}

/** Of the values given, those that differ from what the instrument has. */
function differing(before: InstrumentRow, row: Row): Row {
  return Object.fromEntries(
    Object.entries(row).filter(([key, value]) => value !== undefined && value !== before[key as keyof Row]),
  );
}
