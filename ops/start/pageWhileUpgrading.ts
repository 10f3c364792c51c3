import { once } from 'node:events';
import { createServer } from 'node:http';
import { db } from '#db/client';
import { schemaState } from '#db/migrateUp';
import { behindGate } from '#ops/http/maintenance';

/**
 * Answers in the web's place while an upgrade applies its migrations, as the web itself does before its schema is current. Where there is
 * nothing to upgrade, a new database above all, nothing answers: whoever waits for the first start must not take this for it.
 * @returns what ends it, so that the web can listen.
 */
export async function pageWhileUpgrading(at: { host: string; port: number }): Promise<() => Promise<void>> {
  const { pending } = await schemaState();
  const isUpgrade = pending.length > 0 && (await db().schema.hasTable('users'));
  if (!isUpgrade) return async () => undefined;
  const never = () => {
    throw new Error('The page of an upgrade has nothing behind it.');
  };
  const server = createServer(behindGate(never, { isOpen: false }));
  server.listen(at.port, at.host);
  await once(server, 'listening');
  return async () => {
    const closed = once(server, 'close');
    server.close();
    server.closeAllConnections();
    await closed;
  };
}
