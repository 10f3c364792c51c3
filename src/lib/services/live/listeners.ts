import { type LiveInterval } from '#lib/contracts/live';
import { log } from '#lib/config/log';
import { newestOf } from './newest';

/** Somebody who wants to know what a network's stations measure. */
export interface Listener {
  networkId: number;
  /** Whose listening counts against the bound for one person. */
  userId: string;
  /** Called with what is new to this listener; at first with every station. */
  tell: (intervals: LiveInterval[]) => void;
  /** Called once when the process is about to end. */
  end: () => void;
}

const MOST_LISTENERS = 200;
export const MOST_LISTENERS_OF_ONE = 10;
const EVERY_MS = 1000;

/** Each listener with what it was told last, by station code. */
const listeners = new Map<Listener, Map<string, string>>();
let timer: NodeJS.Timeout | undefined;

/** Why there is no room for a listener: this process bears no more, or the person has as many as one may have. */
export type NoRoom = 'process-full' | 'person-full';

/**
 * Adds a listener and answers what takes it away again, or why there is no room for it. However many there are, the database is asked once a second, and not at all without any.
 */
export function listen(listener: Listener): (() => void) | NoRoom {
  const ofOne = [...listeners.keys()].filter(({ userId }) => userId === listener.userId).length;
  if (ofOne >= MOST_LISTENERS_OF_ONE) return 'person-full';
  if (listeners.size >= MOST_LISTENERS) return 'process-full';
  listeners.set(listener, new Map());
  endWithProcess();
  timer ??= setTimeout(() => void tick(), 0).unref();
  return () => listeners.delete(listener);
}

async function tick(): Promise<void> {
  try {
    await tellAll();
  } catch (error) {
    // Listeners stay: the next second may find the database again.
    log().warn({ err: error }, 'newest intervals not read');
  }
  timer = listeners.size > 0 ? setTimeout(() => void tick(), EVERY_MS).unref() : undefined;
}

async function tellAll(): Promise<void> {
  const networkIds = [...new Set([...listeners.keys()].map(({ networkId }) => networkId))];
  if (networkIds.length === 0) return;
  const byNetwork = await newestOf(networkIds);
  const keyed = new Map([...byNetwork].map(([id, intervals]) => [id, intervals.map(withKey)]));
  for (const [listener, told] of listeners) {
    const fresh = (keyed.get(listener.networkId) ?? []).filter(
      ({ interval, key }) => told.get(interval.code) !== key,
    );
    for (const { interval, key } of fresh) told.set(interval.code, key);
    if (fresh.length > 0) listener.tell(fresh.map(({ interval }) => interval));
  }
}

function withKey(interval: LiveInterval): { interval: LiveInterval; key: string } {
  return { interval, key: JSON.stringify(interval) };
}

let isEndingWithProcess = false;

/** Streams would hold up a process that is asked to finish what it has begun. */
function endWithProcess(): void {
  if (isEndingWithProcess) return;
  isEndingWithProcess = true;
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.once(signal, () => {
      for (const listener of listeners.keys()) listener.end();
    });
  }
}
