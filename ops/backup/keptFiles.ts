import { mkdir, readdir } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { startTool, type Tool } from './tool';

/**
 * What of the data directory is no part of a backup: the database's own files, logs, mail and spools of the stand-ins, pictures, other
 * backups. A folder added later is part of it unless it is named here. Files that stand in the data directory itself are secrets.
 */
const LEFT_OUT = new Set(['mariadb', 'log', 'mail', 'demo', 'pictures', 'backups']);

/** Folders of the data directory that belong to a backup. */
export async function keptFolders(dataDir: string, backupDir: string): Promise<string[]> {
  const entries = await readdir(dataDir, { withFileTypes: true }).catch(() => []);
  return entries
    .filter((entry) => entry.isDirectory() && !LEFT_OUT.has(entry.name))
    .map(({ name }) => name)
    .filter((name) => resolve(dataDir, name) !== resolve(backupDir))
    .sort();
}

/** Whether any of the folders that belong to a backup has a file. */
export async function hasKeptFiles(dataDir: string, backupDir: string): Promise<boolean> {
  for (const folder of await keptFolders(dataDir, backupDir)) {
    if ((await readdir(join(dataDir, folder))).length > 0) return true;
  }
  return false;
}

/** Starts an archive of the folders. A file that changes or goes while it is read (an upload, a photo taken away) is no error. */
export function startArchive(dataDir: string, folders: string[]): Tool {
  const which = folders.length === 0 ? ['--files-from=/dev/null'] : ['--', ...folders];
  const args = ['--create', '--format=posix', '--sort=name', `--directory=${dataDir}`, ...which];
  return startTool('tar', args, { goodCodes: [0, 1] });
}

/** Unpacks an archive into the data directory. */
export async function unpack(archive: Readable, dataDir: string): Promise<void> {
  await mkdir(dataDir, { recursive: true, mode: 0o700 });
  // Else tar goes at the mark that ends an archive, sometimes before the stream has been closed, which then looks broken.
  const args = ['--extract', '--ignore-zeros', '--no-same-owner', `--directory=${dataDir}`];
  const tar = startTool('tar', args);
  await Promise.all([pipeline(archive, tar.input), tar.ended]);
}
