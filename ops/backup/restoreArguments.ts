import { existsSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { parseArgs } from 'node:util';
import { Ending, EXIT } from './ending';
import { listSets } from './rotate';

/** What a restore was asked to do. */
export interface RestoreRequest {
  /** Directory of the set of data. */
  data: string;
  /** Directory of the set of keys; null: without personal data. */
  keys: string | null;
  mayReplace: boolean;
  onlyChecks: boolean;
}

const USAGE = 'Usage: ops/restore.sh SET|latest [--keys SET|none] [--replace] [--check]';

/**
 * Reads the arguments. Keys are the newest beside the data unless named, so that whoever was erased since stays erased.
 * @throws {Ending} with the usage.
 */
export async function restoreRequest(args: string[], backupDir: string): Promise<RestoreRequest> {
  const { values, set } = parse(args);
  const data = set === 'latest' ? await newest(backupDir, 'data') : resolve(set);
  if (data === null || !existsSync(data))
    throw new Ending(EXIT.usage, `There is no backup at ${data ?? backupDir}.`);
  const keys =
    values.keys === undefined
      ? await newest(dirname(dirname(data)), 'keys')
      : values.keys === 'none'
        ? null
        : resolve(values.keys);
  return { data, keys, mayReplace: values.replace ?? false, onlyChecks: values.check ?? false };
}

function parse(args: string[]) {
  try {
    const { values, positionals } = parseArgs({
      args,
      allowPositionals: true,
      options: { keys: { type: 'string' }, replace: { type: 'boolean' }, check: { type: 'boolean' } },
    });
    const [set, ...more] = positionals;
    if (set === undefined || more.length > 0) throw new Error('One set is named.');
    return { values, set };
  } catch (error) {
    throw new Ending(EXIT.usage, `${(error as Error).message}\n${USAGE}`);
  }
}

async function newest(backupDir: string, kind: 'data' | 'keys'): Promise<string | null> {
  const name = (await listSets(backupDir, kind)).at(-1);
  return name === undefined ? null : join(backupDir, kind, name);
}
