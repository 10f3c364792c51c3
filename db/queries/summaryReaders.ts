import { pool, type Connection } from './connection';

/** What a person wants to be told of a network’s months, and when the person looked last. */
export interface SummaryReader {
  /** Null: as the role has it. */
  isTold: boolean | null;
  visitedAt: Date | null;
  /** The visit before the one of the last half-hour: what changed is told since then. */
  previousVisitAt: Date | null;
}

interface Key {
  networkId: number;
  userId: string;
}

const NOBODY: SummaryReader = { isTold: null, visitedAt: null, previousVisitAt: null };

export async function findReader(
  { networkId, userId }: Key,
  conn: Connection = pool(),
): Promise<SummaryReader> {
  const row = await conn('summary_readers')
    .where({ network_id: networkId, user_id: userId })
    .first({ isTold: 'is_told', visitedAt: 'visited_at', previousVisitAt: 'previous_visit_at' });
  return row ? { ...row, isTold: row.isTold === null ? null : row.isTold === 1 } : NOBODY;
}

export async function setTold(
  { networkId, userId }: Key,
  isTold: boolean,
  conn: Connection = pool(),
): Promise<void> {
  await conn('summary_readers')
    .insert({ network_id: networkId, user_id: userId, is_told: isTold })
    .onConflict(['network_id', 'user_id'])
    .merge(['is_told']);
}

export async function setVisit(
  { networkId, userId }: Key,
  visit: Pick<SummaryReader, 'visitedAt' | 'previousVisitAt'>,
  conn: Connection = pool(),
): Promise<void> {
  await conn('summary_readers')
    .insert({
      network_id: networkId,
      user_id: userId,
      visited_at: visit.visitedAt,
      previous_visit_at: visit.previousVisitAt,
    })
    .onConflict(['network_id', 'user_id'])
    .merge(['visited_at', 'previous_visit_at']);
}

/** Addresses of those who may sign in and are told when a month of a network is issued: regulators, unless they said otherwise. */
export async function listToldPeople(
  networkId: number,
  conn: Connection = pool(),
): Promise<{ userId: string; email: string }[]> {
  return conn('memberships as m')
    .join('users as u', 'u.id', 'm.user_id')
    .leftJoin('summary_readers as r', (join) =>
      join.on('r.user_id', 'm.user_id').andOn('r.network_id', 'm.network_id'),
    )
    .where('m.network_id', networkId)
    .whereNull('u.disabled_at')
    .groupBy('u.id', 'u.email')
    .havingRaw(`MAX(COALESCE(r.is_told, m.role = 'regulator')) = 1`)
    .select({ userId: 'u.id', email: 'u.email' });
}
