import type { Connection } from '#db/queries/connection';
import { listJudged, type JudgedExceedance } from '#db/queries/judgedExceedances';
import { pickSettings } from '#db/queries/networks';
import { judgedWindows, LONGEST_WINDOW_SEC, type JudgedWindow } from '#lib/services/limits/force';
import { judgeMeasured, minimumFor, type Judged } from '#lib/services/limits/measure';
import { runDateOf, runsOf, type Run, type WindowAbove } from '#lib/services/limits/runs';
import type { LimitWindow } from '#lib/services/limits/windows';
import type { Evidence } from './verdictOn';
import type { Verdict } from './verdicts';

interface Tried extends JudgedWindow {
  judged: Judged;
}

/**
 * Verdicts on the rolling windows of one date together, of which `own` is one: each run of windows above the limit is an exceedance,
 * and what was found before and is in no run any more is lifted. A run keeps the exceedance that it overlaps, however it has grown.
 */
export async function rollingVerdicts(
  own: JudgedWindow,
  stationId: number,
  evidence: Evidence,
  transaction: Connection,
): Promise<Verdict[]> {
  const windows = windowsOfDate(own, stationId, evidence);
  const closed = windows.filter(({ endSec }) => endSec <= evidence.closedBySec);
  const tried = await tryAll(closed, evidence);
  const runs = runsOf(tried.flatMap(aboveOf), (own.version.stepMin ?? 0) * 60);
  const [first, last] = [windows[0], windows.at(-1)];
  if (!first || !last) return [];
  const held = await listJudged(
    { limitId: own.version.limitId, stationId, fromSec: first.startSec, toSec: last.startSec + 1 },
    transaction,
  );
  const common = {
    version: own.version,
    stationId,
    minimumCoverage: minimumFor(own.version, pickSettings(evidence.timeline, first.startSec)),
    isWindowLost: false,
  };
  const openFromSec = windows[closed.length]?.startSec ?? Infinity;
  const kept = new Set<JudgedExceedance>();
  const standing = runs.map((run): Verdict => {
    const before = heldOf(run, held, kept);
    if (before) kept.add(before);
    const { startSec, endSec, loudest } = run;
    const lastStartSec = endSec - (loudest.endSec - loudest.startSec);
    return {
      ...common,
      startSec,
      endSec,
      heldStartSec: before?.startSec ?? startSec,
      loudest: { startSec: loudest.startSec, endSec: loudest.endSec },
      isOngoing: lastStartSec + (own.version.stepMin ?? 0) * 60 >= openFromSec,
      levelDb: loudest.levelDb,
      coverage: loudest.coverage,
      isExceeded: true,
    };
  });
  const lifted = held.filter((one) => !kept.has(one)).map((one) => ({ ...common, ...leftOf(one, tried) }));
  // What is lifted first makes room for a run that begins where it did.
  return [...lifted, ...standing];
}

/** The windows of the date of one, of the version that judges it, ascending. */
function windowsOfDate(
  own: JudgedWindow,
  stationId: number,
  { ofLimit, timeline }: Evidence,
): JudgedWindow[] {
  const date = runDateOf(own.version, own.startSec, timeline);
  const around = { fromSec: own.startSec - LONGEST_WINDOW_SEC, toSec: own.startSec + LONGEST_WINDOW_SEC };
  return judgedWindows(ofLimit, stationId, around, timeline).filter(
    ({ version, startSec }) => version === own.version && runDateOf(version, startSec, timeline) === date,
  );
}

async function tryAll(windows: readonly JudgedWindow[], { timeline, measured }: Evidence): Promise<Tried[]> {
  const tried: Tried[] = [];
  for (const window of windows) {
    const { version, startSec, endSec } = window;
    const minimumCoverage = minimumFor(version, pickSettings(timeline, startSec));
    const came = await measured.measure(version, { fromSec: startSec, toSec: endSec });
    tried.push({
      ...window,
      judged: judgeMeasured(version, { lengthSec: endSec - startSec, minimumCoverage }, came),
    });
  }
  return tried;
}

function aboveOf({ startSec, endSec, judged }: Tried): WindowAbove[] {
  const { levelDb, coverage, isExceeded } = judged;
  return isExceeded && levelDb !== null ? [{ startSec, endSec, levelDb, coverage }] : [];
}

/** What was found before that a run goes on with: what begins where it does, else what stands and overlaps it. */
function heldOf(
  { startSec, endSec }: Run,
  held: readonly JudgedExceedance[],
  kept: ReadonlySet<JudgedExceedance>,
): JudgedExceedance | undefined {
  const free = held.filter((one) => !kept.has(one));
  const same = held.find((one) => one.startSec === startSec);
  if (same) return kept.has(same) ? undefined : same;
  return free.find((one) => one.state === 'standing' && one.startSec < endSec && one.endSec > startSec);
}

/** What is left of an exceedance that no run has: the loudest of its windows now, or nothing where it has none. */
function leftOf(
  held: JudgedExceedance,
  tried: readonly Tried[],
): Omit<Verdict, 'version' | 'stationId' | 'minimumCoverage'> {
  const { startSec, endSec } = held;
  const left = tried
    .filter((one) => one.startSec >= startSec && one.endSec <= endSec)
    .reduce<Tried | null>((best, one) => (isLouder(one, best) ? one : best), null);
  const loudest: LimitWindow | null = left && { startSec: left.startSec, endSec: left.endSec };
  return {
    startSec,
    endSec,
    heldStartSec: startSec,
    loudest,
    isOngoing: false,
    levelDb: left ? left.judged.levelDb : held.levelDb,
    coverage: left ? left.judged.coverage : held.coverage,
    isExceeded: false,
    isWindowLost: left === null,
  };
}

function isLouder({ judged }: Tried, best: Tried | null): boolean {
  return best === null || (judged.levelDb ?? -Infinity) > (best.judged.levelDb ?? -Infinity);
}
