import { pool, type Connection } from './connection';

/** What the site did in a stretch of time (half-open, epoch seconds). */
export interface NewActivity {
  /** In the site's own words: "ship at berth". */
  kind: string;
  place: string;
  fromSec: number;
  toSec: number;
  note: string;
}

export interface ActivityRow extends NewActivity {
  id: number;
  createdAt: Date;
  createdByName: string | null;
  /** Null while it stands. */
  withdrawnAt: Date | null;
  withdrawnByName: string | null;
  withdrawalReason: string | null;
}

function selectActivities(conn: Connection) {
  return conn('activities')
    .leftJoin({ creator: 'users' }, 'creator.id', 'activities.created_by')
    .leftJoin({ withdrawer: 'users' }, 'withdrawer.id', 'activities.withdrawn_by')
    .select({
      id: 'activities.id',
      kind: 'activities.kind',
      place: 'activities.place',
      fromSec: 'activities.starts_at',
      toSec: 'activities.ends_at',
      note: 'activities.note',
      createdAt: 'activities.created_at',
      createdByName: 'creator.name',
      withdrawnAt: 'activities.withdrawn_at',
      withdrawnByName: 'withdrawer.name',
      withdrawalReason: 'activities.withdrawal_reason',
    });
}

export interface ActivityListQuery {
  networkId: number;
  /** Those that overlap this half-open period. */
  fromSec: number;
  toSec: number;
  /** Null: every kind. */
  kind: string | null;
  limit: number;
  /** Beginning and id of the last one of the page before. */
  after: { fromSec: number; id: number } | null;
}

/** Activities of a network, withdrawn ones too, latest beginning first. */
export async function listActivities(
  query: ActivityListQuery,
  conn: Connection = pool(),
): Promise<ActivityRow[]> {
  const { networkId, fromSec, toSec, kind, limit, after } = query;
  const rows = selectActivities(conn)
    .where('activities.network_id', networkId)
    .where('activities.starts_at', '<', toSec)
    .where('activities.ends_at', '>', fromSec)
    .orderBy([
      { column: 'activities.starts_at', order: 'desc' },
      { column: 'activities.id', order: 'desc' },
    ])
    .limit(limit);
  if (kind !== null) rows.where('activities.kind', kind);
  if (after) rows.whereRaw('(activities.starts_at, activities.id) < (?, ?)', [after.fromSec, after.id]);
  return rows;
}

/** Standing activities of a network that overlap `fromSec <= t < toSec`, of one kind or of all, by their beginning. */
export async function selectStandingActivities(
  networkId: number,
  { fromSec, toSec }: { fromSec: number; toSec: number },
  kind: string | null,
  conn: Connection = pool(),
): Promise<NewActivity[]> {
  const rows = conn('activities')
    .where({ network_id: networkId })
    .whereNull('withdrawn_at')
    .where('starts_at', '<', toSec)
    .where('ends_at', '>', fromSec)
    .orderBy('starts_at')
    .select({ kind: 'kind', place: 'place', fromSec: 'starts_at', toSec: 'ends_at', note: 'note' });
  if (kind !== null) rows.where({ kind });
  return rows;
}

/** Kinds that a network has noted, most frequent first. */
export async function listActivityKinds(networkId: number, conn: Connection = pool()): Promise<string[]> {
  return conn('activities')
    .where({ network_id: networkId })
    .whereNull('withdrawn_at')
    .groupBy('kind')
    .orderByRaw('COUNT(*) DESC, kind')
    .pluck('kind');
}

export async function findActivity(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<ActivityRow | undefined> {
  return selectActivities(conn).where({ 'activities.network_id': networkId, 'activities.id': id }).first();
}

/** Locks a network's operations log until the transaction ends, so that no file is noted twice at once. */
export async function lockActivities(networkId: number, transaction: Connection): Promise<void> {
  await transaction('networks').where({ id: networkId }).forUpdate().first('id');
}

/** Adds activities in one statement and answers the id of the first. */
export async function insertActivities(
  networkId: number,
  activities: readonly NewActivity[],
  createdBy: string,
  conn: Connection,
): Promise<number> {
  const createdAt = new Date();
  const [id] = await conn('activities').insert(
    activities.map(({ kind, place, fromSec, toSec, note }) => ({
      network_id: networkId,
      kind,
      place,
      starts_at: fromSec,
      ends_at: toSec,
      note,
      created_by: createdBy,
      created_at: createdAt,
    })),
  );
  return Number(id);
}

/** Withdraws an activity that stands; false when it was withdrawn before. */
export async function withdrawActivity(
  id: number,
  withdrawal: { by: string; reason: string },
  conn: Connection,
): Promise<boolean> {
  const changed = await conn('activities').where({ id }).whereNull('withdrawn_at').update({
    withdrawn_by: withdrawal.by,
    withdrawn_at: new Date(),
    withdrawal_reason: withdrawal.reason,
  });
  return changed === 1;
}
