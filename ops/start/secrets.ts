import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import dotenv from 'dotenv';

const GENERATED = {
  BITTERN_DB_PASSWORD: () => randomBytes(24).toString('base64url'),
  BITTERN_PERSONAL_DATA_KEY: () => randomBytes(32).toString('hex'),
};

/**
 * Makes the secrets that neither the environment nor `.env` gives, once, in `secrets.env` of the data directory (for its
 * owner's eyes only). The settings reader finds them there.
 */
export function ensureSecrets(dataDirectory: string, environment: Record<string, string | undefined>): void {
  mkdirSync(dataDirectory, { recursive: true, mode: 0o700 });
  const path = join(dataDirectory, 'secrets.env');
  const kept = existsSync(path) ? dotenv.parse(readFileSync(path)) : {};
  const given = existsSync('.env') ? { ...dotenv.parse(readFileSync('.env')), ...environment } : environment;
  const missing = Object.entries(GENERATED).filter(([name]) => !kept[name] && !given[name]);
  if (missing.length === 0) return;
  const lines = [...Object.entries(kept), ...missing.map(([name, make]) => [name, make()])];
  writeFileSync(path, lines.map(([name, value]) => `${name}=${value}\n`).join(''), { mode: 0o600 });
}
