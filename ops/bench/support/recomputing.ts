import { closeDb } from '#db/client';
import { pool } from '#db/queries/connection';
import { findNetworkBySlug } from '#db/queries/networks';
import { markQuarterHours } from '#db/queries/quarterHours';
import { findStation } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { FIRST_SEC, MONTH_SEC } from './months';
import { measure } from './ratios';

const ROUNDS = 9;

/** Recomputes a month of minutes against R and prints the ratio as JSON. Started by `targets.ts` as the worker is. */
const network = await findNetworkBySlug('bench');
const station = network && (await findStation(network.id, 'MINUTES'));
if (!station) throw new Error('There is no station to recompute.');
const recompute = async () => {
  await markQuarterHours(station.id, FIRST_SEC, FIRST_SEC + MONTH_SEC, pool());
  await aggregateAll(async () => undefined);
};
const measured = await measure(station, { recompute }, ROUNDS);
await closeDb();
console.log(JSON.stringify(measured['recompute']));
