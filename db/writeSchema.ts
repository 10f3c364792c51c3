import { writeFile } from 'node:fs/promises';
import { randomBytes } from 'node:crypto';
import knex from 'knex';
import { connectionSettings } from './settings';
import { schemaText } from './schemaText';

/** Writes `db/schema.sql` from the migrations, applied to a database of their own that is dropped afterwards. */
const name = `bittern_schema_${randomBytes(6).toString('hex')}`;
const settings = connectionSettings();
const owner = knex(settings);
await owner.raw('CREATE DATABASE ?? CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci', [name]);
const fresh = knex({ ...settings, connection: { ...(settings.connection as object), database: name } });
try {
  await fresh.migrate.latest();
  const heading = '-- Generated from db/migrations by `npm run schema`; not edited by hand.\n\n';
  await writeFile('db/schema.sql', heading + (await schemaText(fresh)));
} finally {
  await fresh.destroy();
  await owner.raw('DROP DATABASE ??', [name]);
  await owner.destroy();
}
