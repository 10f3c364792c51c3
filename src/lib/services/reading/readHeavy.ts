import { isConnectionLost, isLockConflict } from '#db/queries/connection';
import { isDatabaseAway } from '#db/queries/databaseAway';
import { onReplica, replicaState, type ReplicaState } from '#db/queries/replica';
import { config } from '#lib/config/index';
import { log } from '#lib/config/log';

export interface HeavyRead<T> {
  answer: T;
  /** Everything before is in it, what came since may not be; null: it is of now. */
  dataAsOf: Date | null;
}

/** How long it is believed what the replica said of itself, or that it did not answer. */
const ASKED_EVERY_MS = 2_000;

let asked: { at: number; state: Promise<ReplicaState | null> } | undefined;

/**
 * Runs `work`, which only reads much, on the replica where the settings name one and it is not too far behind; else, and where it fails
 * meanwhile, on the database itself.
 */
export async function readHeavy<T>(work: () => Promise<T>): Promise<HeavyRead<T>> {
  const state = await currentState();
  if (state) {
    try {
      return { answer: await onReplica(work), dataAsOf: new Date(state.asOfSec * 1000) };
    } catch (error) {
      if (!isDatabaseAway(error) && !isConnectionLost(error) && !isLockConflict(error)) throw error;
      log().warn({ err: error }, 'the replica failed; read from the database itself');
      asked = { at: performance.now(), state: Promise.resolve(null) };
    }
  }
  return { answer: await work(), dataAsOf: null };
}

/** How far the replica has come; null where it is not read from. */
async function currentState(): Promise<ReplicaState | null> {
  const { replica } = config().database;
  if (!replica) return null;
  if (!asked || performance.now() - asked.at > ASKED_EVERY_MS) {
    asked = { at: performance.now(), state: replicaState().catch(unreachable) };
  }
  const { at } = asked;
  const state = await asked.state;
  const ageSec = (state?.ageSec ?? Infinity) + (performance.now() - at) / 1000;
  return ageSec <= replica.mostAgeSec ? state : null;
}

function unreachable(error: unknown): null {
  log().warn({ err: error }, 'the replica does not answer; heavy reads go to the database itself');
  return null;
}
