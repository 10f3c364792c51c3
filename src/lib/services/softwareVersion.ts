import { execFile } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import { promisify } from 'node:util';

let found: Promise<string> | undefined;

/** Which Bittern this is: the package's version and, where it runs from a checkout, the commit (`0.1.0+3f1a9ca0b1c2`). */
export function softwareVersion(): Promise<string> {
  found ??= read();
  return found;
}

async function read(): Promise<string> {
  const { version } = JSON.parse(await readFile('package.json', 'utf8')) as { version: string };
  try {
    const { stdout } = await promisify(execFile)('git', ['rev-parse', '--short=12', 'HEAD']);
    return `${version}+${stdout.trim()}`;
  } catch {
    return version;
  }
}
