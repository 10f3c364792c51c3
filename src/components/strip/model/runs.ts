/** A stretch of time in which something holds, epoch seconds, half-open. */
export interface Run {
  fromSec: number;
  toSec: number;
}

/** Stretches of consecutive columns for which `holds` is true. */
export function runsWhere(
  { fromSec, stepSec, count }: { fromSec: number; stepSec: number; count: number },
  holds: (index: number) => boolean,
): Run[] {
  const runs: Run[] = [];
  let startedAt: number | null = null;
  for (let i = 0; i <= count; i += 1) {
    const inside = i < count && holds(i);
    if (inside && startedAt === null) startedAt = i;
    if (!inside && startedAt !== null) {
      runs.push({ fromSec: fromSec + startedAt * stepSec, toSec: fromSec + i * stepSec });
      startedAt = null;
    }
  }
  return runs;
}

/** The part of a run that lies within another stretch, or null. */
export function clipRun(run: Run, within: Run): Run | null {
  const fromSec = Math.max(run.fromSec, within.fromSec);
  const toSec = Math.min(run.toSec, within.toSec);
  return fromSec < toSec ? { fromSec, toSec } : null;
}

/** Runs in order of time, those that touch or overlap made one. */
export function joinRuns(runs: readonly Run[]): Run[] {
  const joined: Run[] = [];
  for (const { fromSec, toSec } of runs) {
    const last = joined.at(-1);
    if (last && fromSec <= last.toSec) last.toSec = Math.max(last.toSec, toSec);
    else joined.push({ fromSec, toSec });
  }
  return joined;
}
