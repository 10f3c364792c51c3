import { randomUUID } from 'node:crypto';
import { inTransaction } from '#db/queries/connection';
import { insertNetwork, insertSettings, type NetworkSettings } from '#db/queries/networks';
import { insertStation, type NewStation } from '#db/queries/stations';
import { insertMembership, insertUser, type Role } from '#db/queries/users';
import { startSession } from '#lib/auth/sessions';

/** Settings as the contract's example has them, in Europe/London. */
export const DEFAULT_SETTINGS: NetworkSettings = {
  effectiveFromSec: 0,
  timeZone: 'Europe/London',
  scheme: { dayStartMin: 7 * 60, eveningStartMin: 19 * 60, nightStartMin: 23 * 60 },
  minimumCoverage: 0.75,
  rules: { maximumWindSpeedMs: 5, excludeRain: false },
};

/** Adds a network and answers its id. */
export function makeNetwork(slug: string, settings: Partial<NetworkSettings> = {}): Promise<number> {
  return inTransaction(async (transaction) => {
    const id = await insertNetwork({ slug, name: `Network ${slug}` }, transaction);
    await insertSettings(id, { ...DEFAULT_SETTINGS, ...settings }, null, transaction);
    return id;
  });
}

/** Adds a person, holding `roles` in a network, and answers the person's id and a session id signed in. */
export async function makePerson(
  networkId: number | null,
  roles: Role[] = [],
  isAdministrator = false,
): Promise<{ userId: string; session: string }> {
  const userId = randomUUID();
  await inTransaction(async (transaction) => {
    const email = `${userId.slice(0, 8)}@people.example`;
    await insertUser(
      { id: userId, email, name: `Person ${userId.slice(0, 4)}`, passwordHash: '-', isAdministrator },
      transaction,
    );
    for (const role of networkId === null ? [] : roles) {
      await insertMembership({ userId, networkId: networkId ?? 0, role }, transaction);
    }
  });
  return { userId, session: (await startSession(userId)).value };
}

/** Adds a one-third-octave station, 25 Hz–8 kHz at one minute unless told otherwise, and answers its id. */
export function makeStation(
  networkId: number,
  code: string,
  changes: Partial<NewStation> = {},
): Promise<number> {
  const station: NewStation = {
    networkId,
    code,
    name: `Station ${code}`,
    latitude: 54.1,
    longitude: 1.6,
    bandFraction: 3,
    intervalSec: 60,
    firstBandIndex: -16,
    lastBandIndex: 9,
    placement: 'free-field',
    mastHeightM: 4,
    surroundings: '',
    acceptsFromSec: null,
    ...changes,
  };
  return inTransaction((transaction) => insertStation(station, transaction));
}
