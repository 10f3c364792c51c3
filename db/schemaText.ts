import type { Knex } from 'knex';

/** Knex's own tables say nothing about the product. */
const BOOKKEEPING = /^schema_migrations/;
/** Which months have a partition is no part of the schema. */
const PARTITIONS = /(PARTITION BY RANGE[^\n]*\n)\s*\([\s\S]*\)$/;
const OPEN_ONLY = '$1(PARTITION `p_open` VALUES LESS THAN MAXVALUE)';

/** The statements that would make the tables and triggers of a migrated database as they are now, by name. */
export async function schemaText(conn: Knex): Promise<string> {
  const [tables] = (await conn.raw('SHOW FULL TABLES')) as [Record<string, string>[]];
  const names = tables.map((row) => Object.values(row)[0] ?? '').filter((name) => !BOOKKEEPING.test(name));
  const statements: string[] = [];
  for (const name of names.sort()) {
    const [[row]] = (await conn.raw('SHOW CREATE TABLE ??', [name])) as [Record<string, string>[]];
    const statement = row?.['Create Table'] ?? row?.['Create View'] ?? '';
    statements.push(`${statement.replace(/ AUTO_INCREMENT=\d+/, '').replace(PARTITIONS, OPEN_ONLY)};\n`);
  }
  return [...statements, ...(await triggerStatements(conn))].join('\n');
}

async function triggerStatements(conn: Knex): Promise<string[]> {
  const [triggers] = (await conn.raw('SHOW TRIGGERS')) as [Record<string, string>[]];
  return triggers
    .map(({ Trigger: name = '', Timing, Event, Table, Statement }) => ({
      name,
      text: `CREATE TRIGGER \`${name}\` ${Timing} ${Event} ON \`${Table}\` FOR EACH ROW\n  ${Statement};\n`,
    }))
    .sort((a, b) => a.name.localeCompare(b.name))
    .map(({ text }) => text);
}
