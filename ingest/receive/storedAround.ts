import type { Knex } from 'knex';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import type { ParsedInterval } from './parseRecord';

/** A wider gap between two records begins another look-up, so that a post that strays over years reads little. */
const WIDEST_GAP_SEC = 3600;

/** Stored intervals of a station (or what else `select` finds by an id) that any of some records may touch, ascending. */
export async function storedAround(
  stationId: number,
  intervals: readonly Pick<ParsedInterval, 'startSec' | 'durationSec'>[],
  transaction: Knex.Transaction,
  select: typeof selectIntervals = selectIntervals,
): Promise<StoredInterval[]> {
  const stored: StoredInterval[] = [];
  for (const { fromSec, toSec } of stretchesOf(intervals)) {
    addStretch(stored, await select(stationId, fromSec, toSec, transaction));
  }
  return stored;
}

/** Adds what is stored in the next stretch: the last of one stretch may reach into the next. */
function addStretch(stored: StoredInterval[], found: readonly StoredInterval[]): void {
  const lastStartSec = stored.at(-1)?.startSec ?? -1;
  for (const interval of found) if (interval.startSec > lastStartSec) stored.push(interval);
}

/** Stretches of time that some records lie in, ascending: what is stored there is what any of them may touch. */
export function stretchesOf(
  intervals: readonly Pick<ParsedInterval, 'startSec' | 'durationSec'>[],
): { fromSec: number; toSec: number }[] {
  const ascending = [...intervals].sort((a, b) => a.startSec - b.startSec);
  const stretches: { fromSec: number; toSec: number }[] = [];
  for (const { startSec, durationSec } of ascending) {
    const last = stretches.at(-1);
    const endSec = startSec + durationSec;
    if (last && startSec - last.toSec <= WIDEST_GAP_SEC) last.toSec = Math.max(last.toSec, endSec);
    else stretches.push({ fromSec: startSec, toSec: endSec });
  }
  return stretches;
}
