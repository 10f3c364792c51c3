import type { Connection } from '#db/queries/connection';
import { inTransaction } from '#db/queries/connection';
import { listLimitVersions, type LimitVersion } from '#db/queries/limits';
import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import {
  deletePendingWindows,
  findDueWindowIds,
  lockPendingWindows,
  type PendingWindow,
} from '#db/queries/pendingWindows';
import { findStationById, type StationRow } from '#db/queries/stations';
import { windowsOf } from '#lib/services/limits/windows';
import { isExceeded, measure } from './measure';
import { recordVerdict, type JudgedChange, type Verdict } from './verdicts';
import { WindowLevels } from './windowLevels';

/** A window is judged this long after its end, so that the last post of a punctual monitor is in. */
export const SETTLE_SEC = 60;
const WINDOWS_A_TRANSACTION = 500;

/** A change to tell people of, with all that the telling needs. */
export interface TellingChange extends JudgedChange {
  verdict: Verdict;
  station: StationRow;
  settings: NetworkSettings;
}

/** Puts the e-mails about some changes into the outbox, in the transaction of the changes. */
export type TellChanges = (changes: TellingChange[], now: Date, transaction: Connection) => Promise<void>;

/**
 * Judges windows that have closed, a bounded number in one transaction: exceedances, e-mails and the deletion of exactly the
 * windows read are durable together or not at all. Safe to run twice at once.
 * @returns how many windows were settled; 0 when none is due.
 */
export async function judgeDueWindows(now: Date, tell: TellChanges): Promise<number> {
  const ids = await findDueWindowIds(Math.floor(now.getTime() / 1000) - SETTLE_SEC, WINDOWS_A_TRANSACTION);
  if (ids.length === 0) return 0;
  return inTransaction(async (transaction) => {
    const windows = await lockPendingWindows(ids, transaction);
    const changes = await judgeAll(windows, now, transaction);
    if (changes.length > 0) await tell(changes, now, transaction);
    await deletePendingWindows(
      windows.map(({ id }) => id),
      transaction,
    );
    return windows.length;
  });
}

async function judgeAll(
  windows: PendingWindow[],
  now: Date,
  transaction: Connection,
): Promise<TellingChange[]> {
  const changes: TellingChange[] = [];
  for (const [stationId, ofStation] of groupBy(distinct(windows), ({ stationId }) => stationId)) {
    const station = await findStationById(stationId, transaction);
    if (!station) continue;
    const timeline = await listSettings(station.networkId, transaction);
    const versions = await listLimitVersions(station.networkId, transaction);
    const levels = new WindowLevels({ station, timeline, validity: 'rules' }, transaction);
    for (const window of ofStation.sort((a, b) => a.startSec - b.startSec)) {
      const version = versionInForce(versions, window, timeline);
      if (!version) continue;
      const settings = pickSettings(timeline, window.startSec);
      const verdict = await verdictOf(window, version, settings, levels);
      const change = await recordVerdict(verdict, now, transaction);
      if (change) changes.push({ ...change, verdict, station, settings });
    }
  }
  return changes;
}

/** The version that a window is judged by: the latest that was in force when it began, if the window is one of its own. */
function versionInForce(
  versions: readonly LimitVersion[],
  window: PendingWindow,
  timeline: NetworkSettings[],
): LimitVersion | undefined {
  const version = versions
    .filter(
      (candidate) => candidate.limitId === window.limitId && candidate.effectiveFromSec <= window.startSec,
    )
    .at(-1);
  if (!version || (version.stationIds !== null && !version.stationIds.includes(window.stationId)))
    return undefined;
  const own = windowsOf(version, window.startSec, window.startSec + 1, timeline);
  return own.some(({ startSec, endSec }) => startSec === window.startSec && endSec === window.endSec)
    ? version
    : undefined;
}

async function verdictOf(
  { stationId, startSec, endSec }: PendingWindow,
  version: LimitVersion,
  settings: NetworkSettings,
  levels: WindowLevels,
): Promise<Verdict> {
  const { levelDb, validSec } = measure(version, await levels.of({ fromSec: startSec, toSec: endSec }));
  const coverage = validSec / (endSec - startSec);
  const hasCoverage = coverage >= (version.minimumCoverage ?? settings.minimumCoverage) - 1e-9;
  return {
    version,
    stationId,
    startSec,
    endSec,
    levelDb,
    coverage,
    isExceeded: isExceeded(version, levelDb, hasCoverage),
  };
}

function distinct(windows: PendingWindow[]): PendingWindow[] {
  return [
    ...new Map(
      windows.map((window) => [`${window.limitId}:${window.stationId}:${window.startSec}`, window]),
    ).values(),
  ];
}

function groupBy<T, K>(items: T[], keyOf: (item: T) => K): Map<K, T[]> {
  const groups = new Map<K, T[]>();
  for (const item of items) groups.set(keyOf(item), [...(groups.get(keyOf(item)) ?? []), item]);
  return groups;
}
