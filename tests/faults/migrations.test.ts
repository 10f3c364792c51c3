import { readdirSync, readFileSync } from 'node:fs';
import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { setTimeout as sleep } from 'node:timers/promises';
import type { Knex } from 'knex';
import { expect, test } from 'vitest';
import { db } from '#db/client';
import { migrateUp, NewerSchemaError } from '#db/migrateUp';
import { schemaText } from '#db/schemaText';
import { Random } from '#ops/bench/support/soak/random';
import { useEmptyDatabase } from './support/emptyDatabase';
import { runScript } from './support/scriptProcess';

useEmptyDatabase();

const DIRECTORY = 'db/migrations';
const NAMES = readdirSync(DIRECTORY).sort();
const committed = () => readFileSync('db/schema.sql', 'utf8').replace(/^--.*\n\n/, '');
const KILLS = 3;

test('a migration killed at any moment is gone on with by the next start', async () => {
  const random = new Random(9);
  const appliedAtKill: number[] = [];
  for (let kill = 0; kill < KILLS; kill += 1) {
    const script = runScript('db/migrate.ts');
    const before = appliedAtKill.at(-1) ?? 0;
    for (let wait = 0; wait < 600 && (await appliedCount()) <= before; wait += 1) await sleep(20);
    await sleep(random.between(0, 300));
    script.kill('SIGKILL');
    await script.ended;
    appliedAtKill.push(await appliedCount());
  }
  expect(appliedAtKill[0]).toBeLessThan(NAMES.length);
  const last = await runScript('db/migrate.ts').ended;
  expect(last).toMatchObject({ code: 0 });
  expect(await schemaText(db())).toBe(committed());
});

async function appliedCount(): Promise<number> {
  if (!(await db().schema.hasTable('schema_migrations'))) return 0;
  return Number((await db()('schema_migrations').count({ count: '*' }).first())?.count);
}

/** Carries out the first of a migration's statements and then breaks off. */
async function carryOut(up: Migration['up'], most: number): Promise<void> {
  let done = 0;
  const raw = async (sql: string) => {
    if (done === most) throw new Error('killed here');
    done += 1;
    await db().raw(sql);
  };
  await up({ raw } as unknown as Knex).catch((error: Error) => expect(error.message).toBe('killed here'));
}

interface Migration {
  up(conn: Knex): Promise<unknown>;
}

test('each migration, carried out in part or wholly and killed before that was noted, is gone on with', async () => {
  await migrateUp(NAMES.slice(0, 1));
  for (const name of NAMES.slice(1)) {
    const { up } = (await import(pathToFileURL(resolve(DIRECTORY, name)).href)) as Migration;
    // What changes rows is noted in the transaction that changes them.
    if (!/INSERT|knex\('/.test(String(up))) {
      await carryOut(up, 1);
      await db()('schema_migrations_lock').update({ is_locked: 1 });
    }
    await migrateUp([name]);
  }
  expect(await schemaText(db())).toBe(committed());
  expect(await appliedCount()).toBe(NAMES.length);
});

test('of two that migrate at once one waits, and both end well', async () => {
  const ends = await Promise.all([runScript('db/migrate.ts').ended, runScript('db/migrate.ts').ended]);
  expect(ends.map(({ code }) => code)).toEqual([0, 0]);
  expect(ends.map(({ output }) => output).join('')).toContain('The schema is up to date.');
  expect(await schemaText(db())).toBe(committed());
});

test('a database of a newer Bittern is left alone: migrating and the worker say so and end', async () => {
  await migrateUp();
  await db()('schema_migrations').insert({
    name: '9000_what_comes.mjs',
    batch: 9,
    migration_time: new Date(),
  });
  await db().raw('DROP TABLE job_troubles');
  const before = await schemaText(db());
  await expect(migrateUp()).rejects.toThrow(NewerSchemaError);
  for (const script of ['db/migrate.ts', 'ingest/worker.ts']) {
    const { code, output } = await runScript(script, { BITTERN_LOG_LEVEL: 'info' }).ended;
    expect(code, script).toBe(1);
    expect(output).toContain('belongs to a newer Bittern (9000_what_comes.mjs');
  }
  expect(await schemaText(db())).toBe(before);
});

test('a worker waits for migrations that are pending, and begins once they are applied', async () => {
  await migrateUp(NAMES.slice(0, 40));
  const worker = runScript('ingest/worker.ts', { BITTERN_LOG_LEVEL: 'info' });
  await until(() => worker.output().includes('migrations are pending'));
  expect(await db().schema.hasTable('job_troubles')).toBe(false);
  await migrateUp();
  await until(() => worker.output().includes('worker runs'));
  worker.kill('SIGTERM');
  expect(await worker.ended).toMatchObject({ code: 0 });
});

async function until(isSo: () => boolean): Promise<void> {
  for (let wait = 0; wait < 1200 && !isSo(); wait += 1) await sleep(50);
  expect(isSo()).toBe(true);
}
