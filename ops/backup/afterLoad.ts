import { existsSync } from 'node:fs';
import { readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { db } from '#db/client';
import { PersonalDataUnreadable, sealValue } from '#lib/services/complaints/personalData';
import { APART } from './dumpReader';
import { digestOf } from './manifest';

/** Tables whose rows name a file under the data directory, with its folder. */
const NAMED_FILES = [
  ['calibration_certificates', 'certificates'],
  ['station_photos', 'photos'],
  ['issued_summary_files', 'summaries'],
] as const;

/** Removes keys and contacts of complaints that the data do not hold: the keys may be younger. Answers how many rows went. */
export async function removeStrayKeys(): Promise<number> {
  let removed = 0;
  for (const table of APART) {
    removed += await db()(table).whereNotIn('complaint_id', db()('complaints').select('id')).delete();
  }
  return removed;
}

/**
 * Ends every session of the backup, and every link that was mailed: one that was revoked or used since must not hold again.
 * @returns how many sessions.
 */
export async function endSessions(): Promise<number> {
  await db()('account_tokens').delete();
  return db()('sessions').delete();
}

/** Files that rows name and that are not there, and files that are not what their name says. */
export async function findFileTroubles(dataDir: string): Promise<string[]> {
  const troubles: string[] = [];
  for (const [table, folder] of NAMED_FILES) {
    const digests = (await db()(table).distinct('sha256').pluck('sha256')) as Buffer[];
    const paths = digests.map((digest) => join(folder, digest.toString('hex')));
    troubles.push(
      ...paths.filter((path) => !existsSync(join(dataDir, path))).map((path) => `${path} is missing`),
    );
    const present = await readdir(join(dataDir, folder)).catch(() => []);
    for (const name of present.filter((file) => /^[0-9a-f]{64}$/.test(file))) {
      if ((await digestOf(join(dataDir, folder, name))) !== name)
        troubles.push(`${join(folder, name)} is damaged`);
    }
  }
  return troubles;
}

/** Whether the personal-data key of the settings opens what was restored; null where there is nothing to open. */
export async function opensPersonalData(): Promise<boolean | null> {
  const key = await db()('complaint_keys')
    .orderBy('complaint_id', 'desc')
    .first('complaint_id', 'wrapped_key');
  if (!key) return null;
  try {
    sealValue(key.wrapped_key, key.complaint_id, 'note', '');
    return true;
  } catch (error) {
    if (error instanceof PersonalDataUnreadable) return false;
    throw error;
  }
}

/** Messages that the worker will send when it starts. */
export async function countWaitingMessages(): Promise<number> {
  const row = await db()('outbox').where({ state: 'waiting' }).count({ count: '*' }).first();
  return Number(row?.['count']);
}
