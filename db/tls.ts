import { readFileSync } from 'node:fs';
import { isIP } from 'node:net';
import type { Config } from '#lib/config/config';

/**
 * What a connection needs to reach the database by TLS alone; nothing where the settings ask for none. The certificate has to be vouched for by
 * the file of the settings, and to carry the host's name where it is reached by one (of an address the driver cannot compare it).
 */
export function tlsOf({ host, tlsCaFile }: Pick<Config['database'], 'host' | 'tlsCaFile'>): {
  ssl?: { ca: Buffer; verifyIdentity: boolean };
} {
  if (tlsCaFile === null) return {};
  return { ssl: { ca: readFileSync(tlsCaFile), verifyIdentity: isIP(host) === 0 } };
}
