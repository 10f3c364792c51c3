import { appendAudit } from '#db/queries/audit';
import { inTransaction, pool, type Connection } from '#db/queries/connection';
import { listAssignments } from '#db/queries/mastAssignments';
import { findMast, insertMast, listMasts, lockMast, updateMast, type MastRow } from '#db/queries/masts';
import { insertMastToken, listMastTokens, revokeMastToken, type MastTokenRow } from '#db/queries/mastTokens';
import { findLastWeather } from '#db/queries/weatherRecords';
import { type Mast, type mastChangeSchema, type newMastSchema } from '#lib/contracts/weather';
import { type z } from 'zod';
import { isDuplicateKey } from '../duplicateKey';
import { done, invalid, unknown, type Outcome } from '../outcome';
import { mastJson, storedFacts } from './mastJson';
import { markStationsOf } from './touched';

export const NO_MAST = unknown('The network has no mast with this code.');

/** Masts of a network by code, retired ones too, each with its newest record. */
export async function networkMasts(networkId: number): Promise<Mast[]> {
  const [rows, assignments] = await Promise.all([listMasts(networkId), listAssignments(networkId)]);
  return Promise.all(
    rows.map(async (row) =>
      mastJson(
        row,
        await lastWeather(row.id),
        assignments.filter(({ mastId }) => mastId === row.id),
      ),
    ),
  );
}

/** A mast with its tokens, newest first. */
export async function mastWithTokens(
  networkId: number,
  code: string,
): Promise<{ row: MastRow; mast: Mast; tokens: MastTokenRow[] } | null> {
  const row = await findMast(networkId, code);
  if (!row) return null;
  return { row, mast: await readMast(row, pool()), tokens: await listMastTokens(row.id) };
}

/** Adds a mast with a first token, told this once. */
export async function addMast(
  networkId: number,
  input: z.output<typeof newMastSchema>,
  userId: string,
): Promise<Outcome<{ mast: Mast; token: string }>> {
  const { code, ...facts } = input;
  try {
    return await inTransaction<Outcome<{ mast: Mast; token: string }>>(async (transaction) => {
      const id = await insertMast(networkId, code, storedFacts(facts), transaction);
      const { token } = await insertMastToken(id, userId, transaction);
      await audit({ networkId, userId, code }, 'mast.add', { ...facts }, transaction);
      const row = await findMast(networkId, code, transaction);
      return row ? done({ mast: await readMast(row, transaction), token }) : NO_MAST;
    });
  } catch (error) {
    if (!isDuplicateKey(error)) throw error;
    return invalid('code', 'is taken by another mast of the network');
  }
}

/** Changes what is said of a mast, retires it or brings it back; figures follow where its records' reach changes. */
export function changeMast(
  networkId: number,
  code: string,
  input: z.output<typeof mastChangeSchema>,
  userId: string,
): Promise<Outcome<Mast>> {
  return inTransaction<Outcome<Mast>>(
    async (transaction) => {
      const before = await findMast(networkId, code, transaction);
      if (!before) return NO_MAST;
      await lockMast(before.id, transaction);
      const { isRetired, ...facts } = input;
      const stored = storedFacts(facts);
      const retiredAt = isRetired ? (before.retiredAt ?? new Date()) : null;
      await updateMast(before.id, stored, retiredAt, transaction);
      if (stored.maximumAgeSec !== before.maximumAgeSec) {
        await markStationsOf(before.id, [{ fromSec: 0, toSec: Math.ceil(Date.now() / 1000) }], transaction);
      }
      await audit({ networkId, userId, code }, 'mast.change', { ...input }, transaction);
      return done(await readMast({ ...before, ...stored, retiredAt }, transaction));
    },
    { isolationLevel: 'read committed' },
  );
}

/** Makes a further token, told this once. */
export function addMastToken(mast: MastRow, userId: string): Promise<string> {
  return inTransaction(async (transaction) => {
    const { id, token } = await insertMastToken(mast.id, userId, transaction);
    await audit({ ...mast, userId }, 'mast-token.make', { tokenId: id }, transaction);
    return token;
  });
}

/** Ends a token at once; answers whether there was one to end. */
export function endMastToken(mast: MastRow, id: number, userId: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const isEnded = await revokeMastToken(mast.id, id, transaction);
    if (isEnded) await audit({ ...mast, userId }, 'mast-token.revoke', { tokenId: id }, transaction);
    return isEnded;
  });
}

async function readMast(row: MastRow, conn: Connection): Promise<Mast> {
  const assignments = await listAssignments(row.networkId, conn);
  const last = await lastWeather(row.id, conn);
  return mastJson(
    row,
    last,
    assignments.filter(({ mastId }) => mastId === row.id),
  );
}

function lastWeather(mastId: number, conn: Connection = pool()) {
  return findLastWeather(mastId, Math.ceil(Date.now() / 1000) + 300, conn);
}

function audit(
  { networkId, userId, code }: { networkId: number; userId: string; code: string },
  action: string,
  detail: Record<string, string | number | boolean>,
  transaction: Connection,
): Promise<void> {
  return appendAudit({ userId, networkId, action, subject: `mast ${code}`, detail }, transaction);
}
