import type { Connection } from './connection';

/** An exceedance as the judge keeps it: one row a limit, station and window. */
export interface JudgedExceedance {
  id: number;
  limitVersionId: number;
  levelDb: number;
  thresholdTenths: number;
  coverage: number;
  state: 'standing' | 'lifted';
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
      levelDb: 'level_db',
      thresholdTenths: 'threshold_tenths',
      coverage: 'coverage',
      state: 'state',
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
  return Number(id);
}

export async function reviseExceedance(
  id: number,
  change: Pick<JudgedExceedance, 'limitVersionId' | 'levelDb' | 'thresholdTenths' | 'coverage' | 'state'>,
  now: Date,
  transaction: Connection,
): Promise<void> {
  await transaction('exceedances').where({ id }).update({
    limit_version_id: change.limitVersionId,
    level_db: change.levelDb,
    threshold_tenths: change.thresholdTenths,
    coverage: change.coverage,
    state: change.state,
    revised_at: now,
  });
}
