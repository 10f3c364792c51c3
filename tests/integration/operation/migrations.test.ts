import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { db } from '#db/client';
import { schemaText } from '#db/schemaText';
import { useFreshSchema } from '../support/freshSchema';

useFreshSchema();

const committed = () => readFileSync('db/schema.sql', 'utf8').replace(/^--.*\n\n/, '');

test('migrations from empty give the committed schema; a second run changes nothing', async () => {
  expect(await schemaText(db())).toBe(committed());
  const [, applied] = (await db().migrate.latest()) as [number, string[]];
  expect(applied).toEqual([]);
  expect(await schemaText(db())).toBe(committed());
});

test('undone to the last and done again they give the same schema', async () => {
  await db().migrate.rollback(undefined, true);
  expect(await schemaText(db())).toBe('');
  await db().migrate.latest();
  expect(await schemaText(db())).toBe(committed());
});

test('every table is InnoDB with utf8mb4', async () => {
  const [tables] = (await db().raw(
    `SELECT table_name AS name, engine, table_collation AS collation FROM information_schema.tables
     WHERE table_schema = DATABASE()`,
  )) as [{ name: string; engine: string; collation: string }[]];
  expect(tables.length).toBeGreaterThan(20);
  for (const table of tables) {
    expect(table.engine, table.name).toBe('InnoDB');
    expect(table.collation, table.name).toMatch(/^utf8mb4_/);
  }
});
