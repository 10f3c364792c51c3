import type { Connection } from '#db/queries/connection';
import {
  findJudged,
  insertExceedance,
  updateExceedance,
  type JudgedExceedance,
} from '#db/queries/judgedExceedances';
import type { LimitVersion } from '#db/queries/limits';
import { toTenths } from '#lib/acoustics/rounding';
import type { LimitWindow } from '#lib/services/limits/windows';

/** What became of a window that is or was above a limit. `lifted`: it no longer stands. `again`: it stands once more. */
export type ChangeKind = 'found' | 'changed' | 'lifted' | 'again';

export interface JudgedChange {
  kind: ChangeKind;
  exceedanceId: number;
  /** 0 when it is found, one more with each change. */
  revision: number;
  /** When it was first found. */
  detectedAt: Date;
  previousLevelDb: number | null;
  /** The limit or its windows are others than before: not the data made the change, or not they alone. */
  isLimitChanged: boolean;
}

export interface Verdict {
  version: LimitVersion;
  stationId: number;
  /** Of rolling windows: of all that make the exceedance. */
  startSec: number;
  endSec: number;
  /** Where what was found before begins, if anything was. */
  heldStartSec: number;
  /** Of rolling windows the loudest one; else null. */
  loudest: LimitWindow | null;
  /** Rolling windows: the next one may go on with it. It is told once more only when that is over. */
  isOngoing: boolean;
  levelDb: number | null;
  coverage: number;
  /** What coverage it took to be compared; null: any, or the window is lost. */
  minimumCoverage: number | null;
  isExceeded: boolean;
  /** The limit, or the network's periods, were changed so that there is no such window any more. */
  isWindowLost: boolean;
}

/** Brings the window's exceedance in line with its verdict; answers what people must be told of, or null. */
export async function recordVerdict(
  verdict: Verdict,
  now: Date,
  transaction: Connection,
): Promise<JudgedChange | null> {
  const { version, stationId, heldStartSec: startSec } = verdict;
  const held = await findJudged({ limitId: version.limitId, stationId, startSec }, transaction);
  return held ? revise(held, verdict, now, transaction) : find(verdict, now, transaction);
}

async function find(
  { version, stationId, startSec, endSec, loudest, levelDb, coverage, isExceeded }: Verdict,
  now: Date,
  transaction: Connection,
): Promise<JudgedChange | null> {
  if (!isExceeded || levelDb === null) return null;
  const { networkId, limitId, id: limitVersionId, thresholdTenths } = version;
  const window = { limitId, stationId, startSec, endSec };
  const exceedanceId = await insertExceedance(
    { ...window, loudest, networkId, limitVersionId, levelDb, thresholdTenths, coverage },
    now,
    transaction,
  );
  return {
    kind: 'found',
    exceedanceId,
    revision: 0,
    detectedAt: now,
    previousLevelDb: null,
    isLimitChanged: false,
  };
}

async function revise(
  held: JudgedExceedance,
  verdict: Verdict,
  now: Date,
  transaction: Connection,
): Promise<JudgedChange | null> {
  const { version, levelDb, coverage, startSec, endSec, loudest, isExceeded } = verdict;
  // What no longer stands keeps the figures that it was lifted with.
  if (!isExceeded && held.state === 'lifted') return null;
  const kind = changeOf(held, verdict);
  const revision = held.revision + (kind === null ? 0 : 1);
  const judged = {
    limitVersionId: version.id,
    startSec,
    endSec,
    loudest,
    // A lifted exceedance whose data are gone keeps the level that it was found with.
    levelDb: levelDb ?? held.levelDb,
    thresholdTenths: version.thresholdTenths,
    coverage,
    state: isExceeded ? ('standing' as const) : ('lifted' as const),
    revision,
  };
  await updateExceedance(held.id, judged, kind && now, transaction);
  if (kind === null) return null;
  return {
    kind,
    exceedanceId: held.id,
    revision,
    detectedAt: held.detectedAt,
    previousLevelDb: held.toldLevelDb ?? held.levelDb,
    isLimitChanged: verdict.isWindowLost || version.id !== held.limitVersionId,
  };
}

/** Null: nothing to tell, the level is the same to a tenth of a dB, or rolling windows are still going on. */
function changeOf(
  held: JudgedExceedance,
  { isExceeded, isOngoing, levelDb, version }: Verdict,
): ChangeKind | null {
  if (!isExceeded) return 'lifted';
  if (held.state === 'lifted') return 'again';
  if (isOngoing) return null;
  const isSameLevel = toTenths(levelDb ?? 0) === toTenths(held.toldLevelDb ?? held.levelDb);
  return isSameLevel && version.thresholdTenths === held.thresholdTenths ? null : 'changed';
}
