import { writeFileSync } from 'node:fs';
import { randomUUID } from 'node:crypto';
import { closeDb, db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { insertUser } from '#db/queries/users';
import { config } from '#lib/config/index';
import { formatInstantUtc } from '#lib/contracts/common';
import { newLimitSchema } from '#lib/contracts/limits';
import { addLimit } from '#lib/services/limits/set';
import { ensureDatabase } from '#ops/start/ownDatabase';
import { makeNetwork, makeStation } from '../station';
import { CARD_STATIONS, SOAK_NETWORK, SOAK_PERSON } from './names';

/**
 * Makes the database that the environment names, with a network, stations and limits in force since the first second of the data.
 * `prepare.ts <stations> <first second> <file for the stations' tokens>`
 */
const [stations, firstSec, tokensPath = ''] = process.argv.slice(2);

await ensureDatabase(config());
await db().migrate.latest();
const networkId = await makeNetwork(SOAK_NETWORK);
const userId = randomUUID();
await inTransaction((transaction) =>
  insertUser(
    { id: userId, email: SOAK_PERSON, name: 'Soak', passwordHash: '-', isAdministrator: true },
    transaction,
  ),
);
for (const [window, threshold] of [
  ['15min', 58],
  ['1h', 60],
] as const) {
  const limit = newLimitSchema.parse({
    name: `Soak ${window}`,
    metric: 'LAeq',
    window,
    threshold,
    effectiveFrom: formatInstantUtc(Number(firstSec)),
  });
  const outcome = await addLimit({ userId, networkId }, limit);
  if (outcome.kind !== 'set') throw new Error(`The limit was not set: ${JSON.stringify(outcome)}`);
}
const tokens: string[] = [];
for (let at = 0; at < Number(stations); at += 1) {
  const { id } = await makeStation(networkId, `SOAK-${at}`, 60);
  tokens.push(await inTransaction((transaction) => insertStationToken(id, null, transaction)));
}
for (const code of CARD_STATIONS) await makeStation(networkId, code, 60);
writeFileSync(tokensPath, JSON.stringify(tokens), { mode: 0o600 });
await closeDb();
