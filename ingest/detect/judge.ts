import type { Connection } from '#db/queries/connection';
import { inTransaction } from '#db/queries/connection';
import { listLimitVersions, lockLimits } from '#db/queries/limits';
import type { Buckets } from '#db/queries/onlyBuckets';
import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import {
  deletePendingWindows,
  findDueWindows,
  lockPendingWindows,
  placeOfWindow,
  type PendingWindow,
} from '#db/queries/pendingWindows';
import { findStationById, type StationRow } from '#db/queries/stations';
import type { StandingOutRange } from '#lib/acoustics/standingOut';
import { groupBy } from '#lib/services/groupBy';
import { byLimit } from '#lib/services/limits/force';
import { concernsEverybody, eachAlone, restingSubjects } from '../jobs/alone';
import { standingOutOf } from './standingOutOf';
import { verdictsOn } from './verdictOn';
import { recordVerdict, type JudgedChange, type Verdict } from './verdicts';
import { WindowEvidence } from '#lib/services/limits/windowEvidence';

const JOB = 'judge-limits';
/** A window is judged this long after its end, so that the last post of a punctual monitor is in. */
const SETTLE_SEC = 60;
const WINDOWS_A_TRANSACTION = 500;

/** A change to tell people of, with all that the telling needs. */
export interface TellingChange extends JudgedChange {
  verdict: Verdict;
  station: StationRow;
  settings: NetworkSettings;
  /** What stands out of the window's mean spectrum, most telling first. */
  standingOut: StandingOutRange[];
}

/** Puts the e-mails about some changes into the outbox, in the transaction of the changes. */
export type TellChanges = (changes: TellingChange[], now: Date, transaction: Connection) => Promise<void>;

/**
 * Judges windows that have closed, a bounded number in one transaction: exceedances, e-mails and the deletion of exactly the
 * windows read are durable together or not at all. Safe to run twice at once: the locks on windows and limits let one judge a
 * window at a time, and read committed lets the next see what the one before found. Where a window cannot be judged, those of each limit and
 * station are judged by themselves, and only its own wait.
 * @param buckets the stations whose windows are judged; by default all.
 * @returns how many windows were settled; 0 when none is due.
 */
export async function judgeDueWindows(
  now: Date,
  tell: TellChanges,
  buckets: Buckets = null,
): Promise<number> {
  const resting = await restingSubjects(JOB, now);
  const due = await findDueWindows(closedBy(now), WINDOWS_A_TRANSACTION, { exceptPlaces: resting, buckets });
  if (due.length === 0) return 0;
  try {
    return await judgeTogether(due, now, tell);
  } catch (error) {
    if (concernsEverybody(error)) throw error;
  }
  const places = groupBy(due, placeOfWindow).entries();
  return eachAlone(
    JOB,
    await withNetworks(places),
    ({ place, networkId }) => ({ name: place, networkId }),
    ({ windows }) => judgeTogether(windows, now, tell),
    now,
  );
}

async function withNetworks(places: Iterable<[string, PendingWindow[]]>) {
  const found = [];
  for (const [place, windows] of places) {
    const station = await findStationById(windows[0]?.stationId ?? 0);
    found.push({ place, windows, networkId: station?.networkId ?? null });
  }
  return found;
}

/** Settles windows in one transaction. */
function judgeTogether(due: readonly PendingWindow[], now: Date, tell: TellChanges): Promise<number> {
  const ids = due.map(({ id }) => id);
  return inTransaction(
    async (transaction) => {
      const windows = await lockPendingWindows(ids, transaction);
      await lockLimits(new Set(windows.map(({ limitId }) => limitId)), transaction);
      const changes = await judgeAll(windows, now, transaction);
      if (changes.length > 0) await tell(changes, now, transaction);
      await deletePendingWindows(
        windows.map(({ id }) => id),
        transaction,
      );
      return windows.length;
    },
    { isolationLevel: 'read committed' },
  );
}

/** Windows that end by this instant (epoch seconds) have closed and settled. */
function closedBy(now: Date): number {
  return Math.floor(now.getTime() / 1000) - SETTLE_SEC;
}

async function judgeAll(
  windows: PendingWindow[],
  now: Date,
  transaction: Connection,
): Promise<TellingChange[]> {
  const changes: TellingChange[] = [];
  const closedBySec = closedBy(now);
  for (const [stationId, ofStation] of groupBy(distinct(windows), ({ stationId }) => stationId)) {
    const station = await findStationById(stationId, transaction);
    if (!station) continue;
    const timeline = await listSettings(station.networkId, transaction);
    const limits = byLimit(await listLimitVersions(station.networkId, transaction));
    const measured = new WindowEvidence({ station, timeline, validity: 'rules' }, transaction);
    const settledDates = new Set<string>();
    for (const window of ofStation.sort((a, b) => a.startSec - b.startSec)) {
      const settings = pickSettings(timeline, window.startSec);
      const ofLimit = limits.get(window.limitId) ?? [];
      const evidence = { ofLimit, timeline, measured, closedBySec, settledDates };
      for (const verdict of await verdictsOn(window, evidence, transaction)) {
        const change = await recordVerdict(verdict, now, transaction);
        if (!change) continue;
        const { startSec, endSec } = verdict.loudest ?? verdict;
        const spectrum = await measured.levels.of({ fromSec: startSec, toSec: endSec });
        changes.push({ ...change, verdict, station, settings, standingOut: standingOutOf(spectrum) });
      }
    }
  }
  return changes;
}

function distinct(windows: PendingWindow[]): PendingWindow[] {
  return [
    ...new Map(
      windows.map((window) => [`${window.limitId}:${window.stationId}:${window.startSec}`, window]),
    ).values(),
  ];
}
