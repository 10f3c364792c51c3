import knex from 'knex';
import type { Connection } from 'mysql2/promise';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { missingRights } from '#db/queries/accountRights';
import { connectionSettings } from '#db/settings';
import { checkRights } from '#ingest/jobs/checkRights';
import { config } from '#lib/config/index';
import { jobTroublesOf } from '#lib/services/operation/jobTroubles';
import { makeAppAccount } from '#ops/database/appAccount';
import { useFreshSchema } from '../support/freshSchema';
import { whoMayGrant } from '../support/whoMayGrant';

useFreshSchema();

let root: Connection;
let account: { user: string; password: string };
let pool: ReturnType<typeof knex>;

beforeAll(async () => {
  const { host, port, name: database, user: owner } = config().database;
  root = await whoMayGrant();
  account = await makeAppAccount(root, { owner: `${owner}_m${database.slice(-6)}`, database });
  pool = knex({ ...connectionSettings(), connection: { host, port, ...account, database } });
});

afterAll(async () => {
  await pool.destroy();
  await root.query('DROP USER ?@?', [account.user, '127.0.0.1']);
  await root.end();
});

const revoke = (rights: string, table: string) =>
  root.query(`REVOKE ${rights} ON \`${config().database.name}\`.\`${table}\` FROM ?@'127.0.0.1'`, [
    account.user,
  ]);

const troubles = async () =>
  (await jobTroublesOf(null)).filter(({ job }) => job === 'work with the database');

test('the account that the grants are for lacks nothing, nor does the owner', async () => {
  expect(await missingRights(pool as never)).toEqual([]);
  expect(await missingRights()).toEqual([]);
});

test('after an upgrade without new grants administrators read what is missing and what to do, until it is there', async () => {
  await revoke('ALTER, DROP', 'interval_levels');
  // A table that the upgrade brought.
  await revoke('SELECT, INSERT, UPDATE, DELETE', 'leases');
  expect(await missingRights(pool as never)).toEqual([
    'interval_levels: ALTER, DROP',
    'leases: SELECT, INSERT, UPDATE, DELETE',
  ]);
  await checkRights(new Date(), pool as never);
  const [trouble] = await troubles();
  expect(trouble?.subject).toBe('the database account');
  expect(trouble?.failure).toContain('repeat the grants (ops/guide.md, Upgrade, 4)');
  expect(trouble?.failure).toContain('interval_levels: ALTER, DROP');
  await checkRights(new Date());
  expect(await troubles()).toEqual([]);
});
