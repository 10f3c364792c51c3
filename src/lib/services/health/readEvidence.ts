import { pool, type Connection } from '#db/queries/connection';
import { countClockAhead, selectQuarterEvidence, selectWindEvidence } from '#db/queries/healthEvidence';
import { selectIntervals, type StoredInterval } from '#db/queries/intervals';
import { type StationClock } from '#db/queries/stationClocks';
import { type LatestInterval } from '#db/queries/stationLatest';
import { type StationRow } from '#db/queries/stations';
import { consistencyOf } from '#lib/acoustics/consistency';
import { FLAGS } from '#lib/acoustics/validity';
import { type FullThresholds } from '#lib/contracts/health';
import { quarterAt } from '#lib/time/quarters';
import { windStretchSec } from './contentRules';
import { type IntervalEvidence, type StationEvidence } from './evidence';
import { floorsOf, USUAL_DAYS } from './floor';

const HOUR_SEC = 3600;
const DAY_SEC = 86_400;
const LEAST_INTERVALS = 10;
/** The newest quarter-hours may still be on their way, or waiting to be computed. */
const SETTLING_SEC = 3600;

interface Known {
  station: Pick<StationRow, 'id' | 'intervalSec' | 'createdAt' | 'expectedFlags'>;
  latest: LatestInterval | undefined;
  clock: StationClock | undefined;
  thresholds: FullThresholds;
  nowSec: number;
}

/** Reads what a station's health is judged by: an hour of intervals, a fortnight of quarter-hours without their bands. */
export async function readEvidence(
  { station, latest, clock, thresholds, nowSec }: Known,
  conn: Connection = pool(),
): Promise<StationEvidence> {
  const newestEndSec = latest ? latest.startSec + latest.durationSec : null;
  const lookSec = Math.max(
    HOUR_SEC,
    thresholds.frozenForMinutes * 60 + station.intervalSec,
    LEAST_INTERVALS * station.intervalSec,
  );
  const endSec = newestEndSec ?? nowSec;
  const settledSec = quarterAt(nowSec - SETTLING_SEC);
  const [intervals, quarters, wind, refusedAheadCount] = await Promise.all([
    selectIntervals(station.id, endSec - lookSec, endSec, conn),
    selectQuarterEvidence(station.id, settledSec - (USUAL_DAYS + 1) * DAY_SEC, settledSec, conn),
    readWind(station.id, thresholds.windStuckForHours, endSec, conn),
    countClockAhead(station.id, new Date((nowSec - HOUR_SEC) * 1000), conn),
  ]);
  const lastDay = quarters.filter(({ startSec }) => startSec >= settledSec - DAY_SEC);
  return {
    nowSec,
    intervalSec: station.intervalSec,
    thresholds,
    expectedFlags: station.expectedFlags,
    newestEndSec,
    lastPostSec: latest ? Math.floor(latest.receivedAt.getTime() / 1000) : null,
    intervals: intervals.map(evidenceOf),
    clockAheadSec: clock ? smallerOf(clock.aheadSec, clock.aheadBeforeSec) : null,
    refusedAheadCount,
    received24h: receivedShare(lastDay, settledSec, quarters[0]?.startSec ?? null),
    floorDb: floorsOf(quarters, settledSec),
    wind,
  };
}

/** Share of the 24 hours before `endSec` that was received; of a station that has just begun, of what elapsed since. */
export function receivedShare(
  quarters: readonly { validSec: number; excludedSec: number }[],
  endSec: number,
  firstDataSec: number | null,
): number | null {
  if (firstDataSec === null) return null;
  const elapsedSec = endSec - Math.max(endSec - DAY_SEC, firstDataSec);
  if (elapsedSec < HOUR_SEC) return null;
  const receivedSec = quarters.reduce((sum, { validSec, excludedSec }) => sum + validSec + excludedSec, 0);
  return Math.min(1, receivedSec / elapsedSec);
}

async function readWind(stationId: number, hours: number, endSec: number, conn: Connection) {
  const found = await selectWindEvidence(stationId, endSec - hours * HOUR_SEC, endSec, conn);
  if (found.leastMs !== 0 || found.mostMs !== 0) return found;
  return selectWindEvidence(stationId, endSec - windStretchSec(hours, 0), endSec, conn);
}

function evidenceOf(interval: StoredInterval): IntervalEvidence {
  const { laeqCentiDb, lafmaxCentiDb, lafminCentiDb, lceqCentiDb, levelsCentiDb } = interval;
  const isComputed = (interval.flags & FLAGS.laeqComputed) !== 0;
  const consistency = consistencyOf(laeqCentiDb, interval.bandFraction, levelsCentiDb, interval.bandIndices);
  return {
    startSec: interval.startSec,
    durationSec: interval.durationSec,
    fingerprint: [laeqCentiDb, lafmaxCentiDb, lafminCentiDb, lceqCentiDb, ...levelsCentiDb].join(','),
    isInconsistent:
      isComputed || consistency.kind === 'not-comparable' ? null : consistency.kind === 'inconsistent',
    batteryV: interval.batteryV,
    isCheck: (interval.flags & (FLAGS.calibration | FLAGS.selfcheck)) !== 0,
    flags: interval.flags,
    receivedAtSec: interval.receivedAtSec,
  };
}

const smallerOf = (a: number, b: number) => (Math.abs(a) < Math.abs(b) ? a : b);
