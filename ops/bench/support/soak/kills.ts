import { setTimeout as sleep } from 'node:timers/promises';
import type { Instance, Victim } from './instance';
import { Random } from './random';

const SHORTEST_GAP_MS = 2_000;
const LONGEST_DOWN_MS = 3_000;

/**
 * Kills web, worker and database at random until `signal` aborts; each is started again after a moment, and a kill may come while
 * another of them is still down or starting. Each has been killed once before any is killed a second time.
 * @param longestGapSec longest time between two kills.
 * @param forMinutes after so long, and once each was killed, what is left is done in peace.
 * @returns how often each was killed.
 */
export async function killAtRandom(
  instance: Instance,
  { seed, longestGapSec, forMinutes }: { seed: number; longestGapSec: number; forMinutes: number },
  signal: AbortSignal,
): Promise<Partial<Record<Victim, number>>> {
  const random = new Random(seed ^ 0x5eed);
  const counts = new Map<Victim, number>(instance.victims.map((victim) => [victim, 0]));
  const underWay = new Map<Victim, Promise<void>>();
  const endMs = Date.now() + forMinutes * 60_000;
  const isOver = () => Date.now() > endMs && [...counts.values()].every((count) => count > 0);
  while (!signal.aborted && !isOver()) {
    await sleep(random.between(SHORTEST_GAP_MS, longestGapSec * 1000), undefined, { signal }).catch(
      () => undefined,
    );
    const fewest = Math.min(1, ...counts.values());
    const open = [...counts].flatMap(([one, count]) => (fewest > 0 || count === 0 ? [one] : []));
    const victim = random.oneOf(open as [Victim, ...Victim[]]);
    const downMs = random.between(0, LONGEST_DOWN_MS);
    if (signal.aborted || underWay.has(victim)) continue;
    counts.set(victim, (counts.get(victim) ?? 0) + 1);
    const kill = instance.kill(victim, downMs);
    underWay.set(
      victim,
      kill.finally(() => underWay.delete(victim)),
    );
  }
  await Promise.all(underWay.values());
  return Object.fromEntries(counts);
}
