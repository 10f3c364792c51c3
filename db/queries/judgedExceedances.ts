import type { Connection } from './connection';
import { keepRevision } from './exceedanceRevisions';

/**
 * The longest exceedance: rolling windows that begin on one date, of 25 h where the clock is put back, the last of them a day long;
 * with room.
 */
export const LONGEST_EXCEEDANCE_SEC = 51 * 3600;

/** An exceedance as the judge keeps it: one row a limit, station and beginning of a window. */
export interface JudgedExceedance {
  id: number;
  limitVersionId: number;
  startSec: number;
  endSec: number;
  /** Of a rolling limit the loudest of the windows that make it; else null. */
  loudest: { startSec: number; endSec: number } | null;
  levelDb: number;
  /** As it was when people were last told of it. */
  toldLevelDb: number | null;
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
  const [found] = await listJudged(
    { limitId, stationId, fromSec: startSec, toSec: startSec + 1 },
    transaction,
  );
  return found;
}

/** Exceedances of a limit at a station, lifted ones too, that begin in `fromSec <= t < toSec`, in order of time. */
export async function listJudged(
  where: Pick<JudgedWindow, 'limitId' | 'stationId'> & { fromSec: number; toSec: number },
  transaction: Connection,
): Promise<JudgedExceedance[]> {
  const rows: (Omit<JudgedExceedance, 'loudest'> & LoudestRow)[] = await transaction('exceedances')
    .where({ limit_id: where.limitId, station_id: where.stationId })
    .where('starts_at', '>=', where.fromSec)
    .where('starts_at', '<', where.toSec)
    .orderBy('starts_at')
    .select({
      id: 'id',
      limitVersionId: 'limit_version_id',
      startSec: 'starts_at',
      endSec: 'ends_at',
      loudestStartSec: 'loudest_starts_at',
      loudestEndSec: 'loudest_ends_at',
      levelDb: 'level_db',
      toldLevelDb: transaction('exceedance_revisions as r')
        .whereRaw('r.exceedance_id = exceedances.id')
        .orderBy('r.revision', 'desc')
        .limit(1)
        .select('r.level_db'),
      thresholdTenths: 'threshold_tenths',
      coverage: 'coverage',
      state: 'state',
      revision: 'revision',
      detectedAt: 'detected_at',
    });
  return rows.map(({ loudestStartSec, loudestEndSec, ...row }) => ({
    ...row,
    loudest:
      loudestStartSec === null || loudestEndSec === null
        ? null
        : { startSec: loudestStartSec, endSec: loudestEndSec },
  }));
}

interface LoudestRow {
  loudestStartSec: number | null;
  loudestEndSec: number | null;
}

export interface NewExceedance extends JudgedWindow {
  networkId: number;
  limitVersionId: number;
  endSec: number;
  loudest: JudgedExceedance['loudest'];
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
    loudest_starts_at: exceedance.loudest?.startSec ?? null,
    loudest_ends_at: exceedance.loudest?.endSec ?? null,
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
  judged: Omit<JudgedExceedance, 'id' | 'detectedAt' | 'toldLevelDb'>,
  revisedAt: Date | null,
  transaction: Connection,
): Promise<void> {
  await transaction('exceedances')
    .where({ id })
    .update({
      limit_version_id: judged.limitVersionId,
      starts_at: judged.startSec,
      ends_at: judged.endSec,
      loudest_starts_at: judged.loudest?.startSec ?? null,
      loudest_ends_at: judged.loudest?.endSec ?? null,
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
