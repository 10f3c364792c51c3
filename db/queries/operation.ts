import { schemaState } from '../migrateUp';
import { pool, type Connection } from './connection';

/** How the work stands: everything that /readyz and /metrics tell. */
export interface OperationState {
  lastTick: Date | null;
  dirtyQuarters: number;
  outboxOldestSec: number | null;
  outboxWaiting: number;
  outboxDead: number;
  quarantineOpen: number;
  pendingMigrations: number;
  /** Parts of jobs that fail while the rest goes on. */
  jobTroubles: number;
}

export async function readOperationState(now: Date, conn: Connection = pool()): Promise<OperationState> {
  const [tick, dirty, outbox, quarantine, schema, troubles] = await Promise.all([
    // What a clock that was ahead has noted is no sign of life.
    conn('job_runs')
      .where('started_at', '<=', new Date(now.getTime() + 60_000))
      .max({ at: 'started_at' })
      .first(),
    conn('dirty_marks')
      .count({ count: conn.raw('DISTINCT station_id, quarter_starts_at') })
      .first(),
    conn('outbox')
      .whereIn('state', ['waiting', 'dead'])
      .groupBy('state')
      .select<{ state: string; count: number; oldest: Date }[]>(
        'state',
        conn.raw('COUNT(*) AS count'),
        conn.raw('MIN(created_at) AS oldest'),
      ),
    conn('quarantine').whereNull('settled_at').count({ count: '*' }).first(),
    schemaState(),
    conn('job_troubles').count({ count: '*' }).first(),
  ]);
  const waiting = outbox.find((row) => row.state === 'waiting');
  const dead = outbox.find((row) => row.state === 'dead');
  return {
    lastTick: tick?.at ?? null,
    dirtyQuarters: Number(dirty?.count ?? 0),
    outboxOldestSec: waiting ? Math.max(0, (now.getTime() - waiting.oldest.getTime()) / 1000) : null,
    outboxWaiting: Number(waiting?.count ?? 0),
    outboxDead: Number(dead?.count ?? 0),
    quarantineOpen: Number(quarantine?.count ?? 0),
    pendingMigrations: schema.pending.length,
    jobTroubles: Number(troubles?.count ?? 0),
  };
}
