import { findJudged, insertExceedance, reviseExceedance } from '#db/queries/judgedExceedances';
import type { Connection } from '#db/queries/connection';
import type { LimitVersion } from '#db/queries/limits';
import { toTenths } from '#lib/acoustics/rounding';

/** What became of a window that is or was above a limit. `unchanged` needs no telling. */
export type ChangeKind = 'found' | 'changed' | 'lifted' | 'again';

export interface JudgedChange {
  kind: ChangeKind;
  exceedanceId: number;
  /** When it was first found. */
  detectedAt: Date;
  previousLevelDb: number | null;
}

export interface Verdict {
  version: LimitVersion;
  stationId: number;
  startSec: number;
  endSec: number;
  levelDb: number | null;
  coverage: number;
  isExceeded: boolean;
}

/** Brings the window's exceedance in line with its verdict; answers what changed, or null. */
export async function recordVerdict(
  verdict: Verdict,
  now: Date,
  transaction: Connection,
): Promise<JudgedChange | null> {
  const { version, levelDb, coverage, isExceeded } = verdict;
  const window = { limitId: version.limitId, stationId: verdict.stationId, startSec: verdict.startSec };
  const standing = await findJudged(window, transaction);
  if (!standing) {
    if (!isExceeded || levelDb === null) return null;
    const { networkId, id: limitVersionId, thresholdTenths } = version;
    const row = {
      ...window,
      networkId,
      limitVersionId,
      endSec: verdict.endSec,
      levelDb,
      thresholdTenths,
      coverage,
    };
    const exceedanceId = await insertExceedance(row, now, transaction);
    return { kind: 'found', exceedanceId, detectedAt: now, previousLevelDb: null };
  }
  const kind = changeOf(standing, verdict);
  if (kind === null) return null;
  const change = {
    limitVersionId: version.id,
    // A lifted exceedance whose data are gone keeps the level that it was found with.
    levelDb: levelDb ?? standing.levelDb,
    thresholdTenths: version.thresholdTenths,
    coverage,
    state: isExceeded ? ('standing' as const) : ('lifted' as const),
  };
  await reviseExceedance(standing.id, change, now, transaction);
  return {
    kind,
    exceedanceId: standing.id,
    detectedAt: standing.detectedAt,
    previousLevelDb: standing.levelDb,
  };
}

function changeOf(
  standing: { state: 'standing' | 'lifted'; levelDb: number; thresholdTenths: number },
  { isExceeded, levelDb, version }: Verdict,
): ChangeKind | null {
  if (!isExceeded) return standing.state === 'standing' ? 'lifted' : null;
  if (standing.state === 'lifted') return 'again';
  const isSameLevel = toTenths(levelDb ?? 0) === toTenths(standing.levelDb);
  return isSameLevel && version.thresholdTenths === standing.thresholdTenths ? null : 'changed';
}
