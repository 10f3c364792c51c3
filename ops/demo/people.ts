import { randomUUID } from 'node:crypto';
import { inTransaction } from '#db/queries/connection';
import { insertNetwork, insertSettings } from '#db/queries/networks';
import { insertMembership, insertUser } from '#db/queries/users';
import { hashPassword } from '#lib/auth/passwords';
import { ESTUARY_ZONE } from '#ingest/monitor/soundscape/clock';
import { DEMO_ACCOUNTS } from './accounts';

export const DEMO_NETWORK = { slug: 'merrow', name: 'Merrow Estuary' } as const;

/** Ids of the demo's people by e-mail address. */
export type DemoPeople = Map<string, string>;

/** The network with its settings, and one account for each role. */
export async function seedPeople(password: string): Promise<{ networkId: number; people: DemoPeople }> {
  const passwordHash = await hashPassword(password);
  return inTransaction(async (transaction) => {
    const networkId = await insertNetwork({ ...DEMO_NETWORK }, transaction);
    const settings = {
      effectiveFromSec: 0,
      timeZone: ESTUARY_ZONE,
      scheme: { dayStartMin: 7 * 60, eveningStartMin: 19 * 60, nightStartMin: 23 * 60 },
      minimumCoverage: 0.75,
      rules: { maximumWindSpeedMs: 5, excludeRain: false },
    };
    await insertSettings(networkId, settings, null, transaction);
    const people: DemoPeople = new Map();
    for (const { email, name, role } of DEMO_ACCOUNTS) {
      const id = randomUUID();
      await insertUser({ id, email, name, passwordHash, isAdministrator: role === null }, transaction);
      if (role !== null) await insertMembership({ userId: id, networkId, role }, transaction);
      people.set(email, id);
    }
    return { networkId, people };
  });
}
