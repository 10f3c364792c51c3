import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { db } from '#db/client';
import { migrateUp } from '#db/migrateUp';
import { schemaText } from '#db/schemaText';
import { fillTables, rowsOfTables } from './support/someRows';
import { useEmptyDatabase } from './support/emptyDatabase';

/** Schemas as they landed, each by what it added to the one before, and the digest of its `db/schema.sql`. */
const LANDED = JSON.parse(readFileSync('tests/fixtures/schemas/landed.json', 'utf8')) as {
  landed: string;
  schemaSha256: string;
  added: string[];
}[];

/** Columns that a later migration moved elsewhere, with what they held. */
const MOVED: Record<string, { column: string; to: string }> = {
  complaint_reports: { column: 'area', to: 'complaints' },
};

useEmptyDatabase();

test.each(LANDED.map(({ landed }, at) => [landed, at] as const))(
  'the schema landed at %s, with rows in every table, becomes today’s and keeps every row',
  async (_, at) => {
    for (const { added } of LANDED.slice(0, at + 1)) await migrateUp(added);
    const then = await schemaText(db());
    expect(createHash('sha256').update(then).digest('hex'), 'as it landed').toBe(LANDED[at]?.schemaSha256);
    await fillTables();
    const movedOf = (table: string) => (MOVED[table] ? [MOVED[table].column] : []);
    const before = await rowsOfTables(movedOf);
    expect(before.size).toBeGreaterThan(25);
    await migrateUp();
    expect(await schemaText(db())).toBe(readFileSync('db/schema.sql', 'utf8').replace(/^--.*\n\n/, ''));
    const after = await rowsOfTables(movedOf, before);
    for (const [table, { rows }] of before) expect(after.get(table)?.rows, table).toEqual(rows);
  },
);
