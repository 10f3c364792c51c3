import { readOperationState } from '#db/queries/operation';

/** A worker that has not begun a job for this long is taken for dead; it ticks each minute. */
const WORKER_DEAD_AFTER_SEC = 180;

export interface Readiness {
  isReady: boolean;
  report: {
    database: 'ok' | 'away';
    worker: { lastTick: string | null };
    dirtyQuarters: number | null;
    outboxOldestSeconds: number | null;
    migrations: 'ok' | 'pending' | 'unknown';
  };
}

const AWAY: Readiness = {
  isReady: false,
  report: {
    database: 'away',
    worker: { lastTick: null },
    dirtyQuarters: null,
    outboxOldestSeconds: null,
    migrations: 'unknown',
  },
};

/** Whether database, migrations and worker are as they must be; a backlog is told but is no reason to refuse. */
export async function readiness(now: Date): Promise<Readiness> {
  const state = await readOperationState(now).catch(() => null);
  if (!state) return AWAY;
  const isWorkerAlive =
    state.lastTick !== null && now.getTime() - state.lastTick.getTime() < WORKER_DEAD_AFTER_SEC * 1000;
  return {
    isReady: isWorkerAlive && state.pendingMigrations === 0,
    report: {
      database: 'ok',
      worker: { lastTick: state.lastTick?.toISOString() ?? null },
      dirtyQuarters: state.dirtyQuarters,
      outboxOldestSeconds: state.outboxOldestSec,
      migrations: state.pendingMigrations === 0 ? 'ok' : 'pending',
    },
  };
}
