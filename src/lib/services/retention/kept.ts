import { type Connection } from '#db/queries/connection';
import { findSeal } from '#db/queries/retention';
import { formatInstantUtc } from '#lib/contracts/common';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { SealedError } from './seal';

interface Span {
  fromSec: number;
  toSec: number;
}

/** Much shorter than what lies between sealing and deleting. */
const REMEMBERED_MS = 60_000;
const remembered = new Map<number, { keptFromSec: number; atMs: number }>();

/** From when on single intervals of a station are kept, epoch seconds; 0: all are. Up to a minute old. */
export async function keptFromSecOf(stationId: number, conn: Connection): Promise<number> {
  const known = remembered.get(stationId);
  if (known && Date.now() - known.atMs < REMEMBERED_MS) return known.keptFromSec;
  const { keptFromSec } = await findSeal(stationId, conn);
  remembered.set(stationId, { keptFromSec, atMs: Date.now() });
  return keptFromSec;
}

/** Forgets what is remembered: this process has sealed stations itself. */
export function forgetKept(): void {
  remembered.clear();
}

/** A period whose ends before `keptFromSec` are moved outwards to quarter-hours, which are all that is left there. */
export function onQuarters<T extends Span>(period: T, keptFromSec: number): T {
  const { fromSec, toSec } = period;
  return {
    ...period,
    fromSec: fromSec < keptFromSec ? quarterAt(fromSec) : fromSec,
    toSec: toSec < keptFromSec ? quarterAt(toSec + QUARTER_SEC - 1) : toSec,
  };
}

/** What stands beside every figure that reaches back beyond what is kept; null where none does. */
export function keptNote(fromSec: number, keptFromSec: number): string | null {
  if (fromSec >= keptFromSec) return null;
  return (
    `Single intervals before ${formatInstantUtc(keptFromSec)} are no longer kept: figures before that are from quarter-hours and from ` +
    'days, evenings and nights, which stay as they were when they were sealed.'
  );
}

/** @throws {SealedError} for what only single intervals tell. */
export function requireKept(fromSec: number, keptFromSec: number): void {
  if (fromSec >= keptFromSec) return;
  throw new SealedError(
    `Single intervals before ${formatInstantUtc(keptFromSec)} are no longer kept, and this is told by them alone. Ask for a later period.`,
  );
}
