/** A partition by time. */
export interface Partition {
  name: string;
  /** Epoch seconds before which its rows begin; null: it is open. */
  endSec: number | null;
}

/** The partition that takes what begins after all others. */
export const OPEN = 'p_open';
/** Months that have partitions before they begin, so that the open one is split while it is empty. */
const MONTHS_AHEAD = 2;

/** Start of the month of UTC so many months after the one that an instant is in. */
function monthStartSec(atSec: number, monthsLater: number): number {
  const at = new Date(atSec * 1000);
  return Date.UTC(at.getUTCFullYear(), at.getUTCMonth() + monthsLater) / 1000;
}

/** Partitions that a table lacks: each month after its last bounded one, up to two months ahead of now. */
export function missingMonths(partitions: readonly Partition[], nowSec: number): Partition[] {
  const ends = partitions.flatMap(({ endSec }) => (endSec === null ? [] : [endSec]));
  const wantedSec = monthStartSec(nowSec, MONTHS_AHEAD + 1);
  const missing: Partition[] = [];
  let lastSec = ends.length > 0 ? Math.max(...ends) : monthStartSec(nowSec, 0);
  while (lastSec < wantedSec) {
    const endSec = monthStartSec(lastSec, 1);
    missing.push({ name: monthName(lastSec), endSec });
    lastSec = endSec;
  }
  return missing;
}

/** Such as `p202612`. */
function monthName(startSec: number): string {
  return `p${new Date(startSec * 1000).toISOString().slice(0, 7).replace('-', '')}`;
}
