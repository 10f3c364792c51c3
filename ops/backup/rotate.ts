import { mkdir, readdir, rm } from 'node:fs/promises';
import { join } from 'node:path';

/** The two kinds of sets, each in a folder of its own. */
export type SetKind = 'data' | 'keys';

const DAY_MS = 86_400_000;
const NAME = /^(\d{4})(\d{2})(\d{2})T(\d{2})(\d{2})(\d{2})Z$/;
const UNFINISHED = '.making-';

/** A set's name: when it was made, UTC. */
export function setName(at: Date): string {
  return at.toISOString().replace(/[-:]|\.\d+/g, '');
}

/** A name under which a set is made, until it is whole. */
export function unfinishedName(name: string): string {
  return `${UNFINISHED}${name}`;
}

/** The sets of a kind by name, oldest first. */
export async function listSets(backupDir: string, kind: SetKind): Promise<string[]> {
  const names = await readdir(join(backupDir, kind)).catch(() => []);
  return names.filter((name) => NAME.test(name)).sort();
}

/** Removes what an interrupted backup left behind. No other may be running. */
export async function removeUnfinished(backupDir: string): Promise<void> {
  for (const kind of ['data', 'keys'] as const) {
    const directory = join(backupDir, kind);
    await mkdir(directory, { recursive: true, mode: 0o700 });
    for (const name of await readdir(directory)) {
      if (name.startsWith(UNFINISHED)) await rm(join(directory, name), { recursive: true });
    }
  }
}

/** Removes the sets of a kind that are older than `days`, but never the newest `atLeast`. Answers the removed names. */
export async function rotate(
  backupDir: string,
  kind: SetKind,
  { days, atLeast, now }: { days: number; atLeast: number; now: Date },
): Promise<string[]> {
  const names = await listSets(backupDir, kind);
  const old = names
    .slice(0, Math.max(0, names.length - atLeast))
    .filter((name) => now.getTime() - timeOf(name) > days * DAY_MS);
  for (const name of old) await rm(join(backupDir, kind, name), { recursive: true });
  return old;
}

function timeOf(name: string): number {
  const [, year, month, day, hour, minute, second] = (NAME.exec(name) ?? []).map(Number);
  return Date.UTC(year ?? 0, (month ?? 1) - 1, day, hour, minute, second);
}
