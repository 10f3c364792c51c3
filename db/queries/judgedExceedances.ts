import type { Connection } from './connection';
import { keepRevision } from './exceedanceRevisions';

/** An exceedance as the judge keeps it: one row a limit, station and beginning of a window. */
export interface JudgedExceedance {
  id: number;
  limitVersionId: number;
  endSec: number;
  levelDb: number;
  thresholdTenths: number;
  coverage: number;
  state: 'standing' | 'lifted';
  /** How often what was found has changed since. */
  revision: number;
  detectedAt: Date;
}

export interface JudgedWindow {
  limitId: number;
  stationId: number;
  startSec: number;
}

export async function findJudged(
  { limitId, stationId, startSec }: JudgedWindow,
  transaction: Connection,
): Promise<JudgedExceedance | undefined> {
  return transaction('exceedances')
    .where({ limit_id: limitId, station_id: stationId, starts_at: startSec })
    .first({
      id: 'id',
      limitVersionId: 'limit_version_id',
      endSec: 'ends_at',
      levelDb: 'level_db',
      thresholdTenths: 'threshold_tenths',
      coverage: 'coverage',
      state: 'state',
      revision: 'revision',
      detectedAt: 'detected_at',
    });
}

export interface NewExceedance extends JudgedWindow {
  networkId: number;
  limitVersionId: number;
  endSec: number;
  levelDb: number;
  thresholdTenths: number;
  coverage: number;
}

export async function insertExceedance(
  exceedance: NewExceedance,
  now: Date,
  transaction: Connection,
): Promise<number> {
  const [id] = await transaction('exceedances').insert({
    network_id: exceedance.networkId,
    station_id: exceedance.stationId,
    limit_id: exceedance.limitId,
    limit_version_id: exceedance.limitVersionId,
    starts_at: exceedance.startSec,
    ends_at: exceedance.endSec,
    level_db: exceedance.levelDb,
    threshold_tenths: exceedance.thresholdTenths,
    coverage: exceedance.coverage,
    detected_at: now,
  });
  await keepRevision(Number(id), transaction);
  return Number(id);
}

/** Brings an exceedance up to date. `revisedAt` is given with a new revision only: a change that people are told of. */
export async function updateExceedance(
  id: number,
  judged: Omit<JudgedExceedance, 'id' | 'detectedAt'>,
  revisedAt: Date | null,
  transaction: Connection,
): Promise<void> {
  await transaction('exceedances')
    .where({ id })
    .update({
      limit_version_id: judged.limitVersionId,
      ends_at: judged.endSec,
      level_db: judged.levelDb,
      threshold_tenths: judged.thresholdTenths,
      coverage: judged.coverage,
      state: judged.state,
      revision: judged.revision,
      ...(revisedAt && { revised_at: revisedAt }),
    });
  if (revisedAt) await keepRevision(id, transaction);
}

/** Windows of standing exceedances of a station that overlap `fromSec <= t < toSec`; none is longer than `longestSec`. */
export async function selectStandingWindows(
  stationId: number,
  { fromSec, toSec, longestSec }: { fromSec: number; toSec: number; longestSec: number },
  conn: Connection,
): Promise<(JudgedWindow & { endSec: number })[]> {
  return conn('exceedances')
    .where({ station_id: stationId, state: 'standing' })
    .where('starts_at', '>', fromSec - longestSec)
    .where('starts_at', '<', toSec)
    .where('ends_at', '>', fromSec)
    .select({ limitId: 'limit_id', stationId: 'station_id', startSec: 'starts_at', endSec: 'ends_at' });
}

/** Windows of standing exceedances of a limit that begin at or after an instant (epoch seconds). */
export async function selectStandingOfLimit(
  limitId: number,
  fromSec: number,
  conn: Connection,
): Promise<(JudgedWindow & { endSec: number })[]> {
  return conn('exceedances')
    .where({ limit_id: limitId, state: 'standing' })
    .where('starts_at', '>=', fromSec)
    .select({ limitId: 'limit_id', stationId: 'station_id', startSec: 'starts_at', endSec: 'ends_at' });
}
