import { setTimeout as sleep } from 'node:timers/promises';
import { VICTIMS, type Instance, type Victim } from './instance';
import { Random } from './random';

const SHORTEST_GAP_MS = 2_000;
const LONGEST_GAP_MS = 12_000;
const LONGEST_DOWN_MS = 3_000;

/**
 * Kills web, worker and database at random until `signal` aborts; each is started again after a moment, and a kill may come while
 * another of them is still down or starting. @returns how often each was killed.
 */
export async function killAtRandom(
  instance: Instance,
  seed: number,
  signal: AbortSignal,
): Promise<Record<Victim, number>> {
  const random = new Random(seed ^ 0x5eed);
  const counts: Record<Victim, number> = { web: 0, worker: 0, database: 0 };
  const underWay = new Map<Victim, Promise<void>>();
  while (!signal.aborted) {
    await sleep(random.between(SHORTEST_GAP_MS, LONGEST_GAP_MS), undefined, { signal }).catch(
      () => undefined,
    );
    const victim = random.oneOf(VICTIMS);
    const downMs = random.between(0, LONGEST_DOWN_MS);
    if (signal.aborted || underWay.has(victim)) continue;
    counts[victim] += 1;
    const kill = instance.kill(victim, downMs);
    underWay.set(
      victim,
      kill.finally(() => underWay.delete(victim)),
    );
  }
  await Promise.all(underWay.values());
  return counts;
}
