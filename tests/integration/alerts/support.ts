import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { findLimit } from '#db/queries/limits';
import { settingsAt } from '#db/queries/networks';
import { findStationById } from '#db/queries/stations';
import type { TellChanges, TellingChange } from '#ingest/detect/judge';
import { tellExceedances } from '#ingest/notify/tellExceedances';
import { makeExceedance } from '../exceedances/support';

interface Found {
  networkId: number;
  stationId: number;
  limit: { limitId: number; versionId: number };
  /** When it is found: a minute after its hour ended. */
  now: Date;
  levelDb: number;
}

/** Address of a person whom `makePerson` added. */
export async function emailOf(userId: string): Promise<string> {
  return (await db()('users').where({ id: userId }).first('email')).email as string;
}

/** Has the limits of a network tell these addresses. */
export async function setRecipients(versionId: number, recipients: string[]): Promise<void> {
  await db()('limit_versions')
    .where({ id: versionId })
    .update({ recipients: JSON.stringify(recipients) });
}

/** Finds an exceedance and tells of it, as the judge does. Answers its number. */
export async function findAndTell(found: Found, tell: TellChanges = tellExceedances): Promise<number> {
  const startSec = Math.floor(found.now.getTime() / 1000) - 3660;
  const exceedanceId = await makeExceedance({ ...found, startSec });
  await db()('exceedances').where({ id: exceedanceId }).update({ detected_at: found.now });
  const change = await changeOf(found, exceedanceId, startSec);
  await inTransaction((transaction) => tell([change], found.now, transaction));
  return exceedanceId;
}

/** Lifts what `findAndTell` found, at `now`, and tells of it, as the judge does. */
export async function liftAndTell(found: Found, exceedanceId: number, now: Date): Promise<void> {
  const startSec = Math.floor(found.now.getTime() / 1000) - 3660;
  const change = await changeOf(found, exceedanceId, startSec);
  const verdict = { ...change.verdict, levelDb: 54, isExceeded: false };
  const lifted = { ...change, kind: 'lifted' as const, revision: 1, previousLevelDb: found.levelDb, verdict };
  await inTransaction((transaction) => tellExceedances([lifted], now, transaction));
}

async function changeOf(
  { networkId, stationId, limit, levelDb, now }: Found,
  exceedanceId: number,
  startSec: number,
): Promise<TellingChange> {
  const station = await findStationById(stationId);
  const version = (await findLimit(networkId, limit.limitId)).at(-1);
  if (!station || !version) throw new Error('There is no such station or limit.');
  return {
    kind: 'found',
    exceedanceId,
    revision: 0,
    detectedAt: now,
    previousLevelDb: null,
    isLimitChanged: false,
    station,
    settings: await settingsAt(networkId, startSec),
    standingOut: [],
    verdict: {
      version,
      stationId,
      startSec,
      endSec: startSec + 3600,
      heldStartSec: startSec,
      loudest: null,
      isOngoing: false,
      levelDb,
      coverage: 0.98,
      minimumCoverage: 0.75,
      isExceeded: true,
      isWindowLost: false,
    },
  };
}

/** Messages of the outbox, oldest first. */
export const outbox = () => db()('outbox').orderBy('id');
