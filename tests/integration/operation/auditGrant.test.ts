import knex from 'knex';
import mysql, { type Connection } from 'mysql2/promise';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { appendAudit, findAuditBreak } from '#db/queries/audit';
import { auditRightsTooWide } from '#db/queries/auditGrant';
import { inTransaction } from '#db/queries/connection';
import { connectionSettings } from '#db/settings';
import { config } from '#lib/config/index';
import { makeAppAccount } from '#ops/database/appAccount';
import { useFreshSchema } from '../support/freshSchema';
import { whoMayGrant } from '../support/whoMayGrant';

useFreshSchema();

let root: Connection;
let app: Connection;
let account: { user: string; password: string };

beforeAll(async () => {
  const { host, port, name, user: owner } = config().database;
  root = await whoMayGrant();
  account = await makeAppAccount(root, { owner: `${owner}_${name.slice(-6)}`, database: name });
  app = await mysql.createConnection({ host, port, ...account, database: name });
  await inTransaction((transaction) =>
    appendAudit(
      { userId: null, networkId: null, action: 'a.b', subject: 'a thing', detail: { a: 1 } },
      transaction,
    ),
  );
});

afterAll(async () => {
  await app.end();
  await root.query('DROP USER ?@?', [account.user, '127.0.0.1']);
  await root.end();
});

const refused = { code: 'ER_TABLEACCESS_DENIED_ERROR' };

test.each([
  "UPDATE audit_log SET subject = 'another'",
  'DELETE FROM audit_log',
  'TRUNCATE audit_log',
  'ALTER TABLE audit_log ADD COLUMN x INT',
  'DROP TABLE audit_log',
  'DELETE FROM audit_head',
  'DELETE FROM issued_summaries',
  'UPDATE issued_summary_files SET sha256 = sha256',
  "DELETE FROM schema_migrations WHERE name = ''",
])('web and worker may not %s', async (statement) => {
  await expect(app.query(statement)).rejects.toMatchObject(refused);
});

test('nor give themselves more', async () => {
  await expect(app.query(`GRANT ALL ON *.* TO '${account.user}'@'127.0.0.1'`)).rejects.toThrow(/denied/);
  await expect(
    app.query('CREATE TRIGGER t BEFORE INSERT ON audit_log FOR EACH ROW SET NEW.at = 0'),
  ).rejects.toThrow(/denied/);
});

test('but everything else that they do in any table', async () => {
  const [rows] = await app.query('SHOW TABLES');
  const tables = (rows as Record<string, string>[]).map((row) => Object.values(row)[0] ?? '');
  expect(tables.length).toBeGreaterThan(60);
  await app.beginTransaction();
  for (const table of tables) await app.query(`SELECT 1 FROM \`${table}\` LIMIT 1 FOR UPDATE`);
  await app.query('UPDATE audit_head SET last_id = last_id + 1');
  await app.rollback();
  expect(await findAuditBreak()).toBeNull();
});

test('a start warns of an account that may do more, and not of this one', async () => {
  expect(await auditRightsTooWide()).toEqual(['UPDATE', 'DELETE', 'DROP', 'ALTER', 'TRIGGER']);
  const settings = connectionSettings();
  const { host, port, name: database } = config().database;
  const pool = knex({
    ...settings,
    connection: { host, port, ...account, database },
  });
  expect(await auditRightsTooWide(pool as never)).toEqual([]);
  await pool.destroy();
});
