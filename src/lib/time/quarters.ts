/** Length of the smallest stored aggregate: every civil zone's hours, days and months are whole quarter-hours. */
export const QUARTER_SEC = 900;

/** Start of the UTC quarter-hour that an instant falls in. */
export function quarterAt(epochSec: number): number {
  return Math.floor(epochSec / QUARTER_SEC) * QUARTER_SEC;
}

/** Starts of every quarter-hour that `from <= t < to` touches. */
export function quartersTouching(fromSec: number, toSec: number): number[] {
  const starts: number[] = [];
  for (let start = quarterAt(fromSec); start < toSec; start += QUARTER_SEC) starts.push(start);
  return starts;
}
