import { existsSync } from 'node:fs';
import { join } from 'node:path';
import dotenv from 'dotenv';
import { parseConfig, type Config } from './config';

let current: Config | undefined;

/**
 * The settings of this process, read once from the environment, then `.env`, then the secrets that
 * `ops/start.sh` generated (earlier sources win).
 * @throws {SettingsError} listing every bad setting at once.
 */
export function config(): Config {
  current ??= load();
  return current;
}

function load(): Config {
  readFileIntoEnvironment('.env');
  readFileIntoEnvironment(join(process.env['BITTERN_DATA_DIR'] || '.bittern', 'secrets.env'));
  return parseConfig(process.env);
}

function readFileIntoEnvironment(path: string): void {
  if (existsSync(path)) dotenv.config({ path, quiet: true });
}
