import { appRightsOn, schemaTables } from '../appRights';
import { pool, type Connection } from './connection';

/** A right that an account has, such as `UPDATE`; table null: on every table. */
export interface HeldRight {
  privilege: string;
  table: string | null;
}

/** The account as these tables name it: `'bittern'@'127.0.0.1'`. */
const GRANTEE = `CONCAT("'", SUBSTRING_INDEX(CURRENT_USER(), '@', 1), "'@'", SUBSTRING_INDEX(CURRENT_USER(), '@', -1), "'")`;

/** The rights of this connection's account on our tables. Those that it has by a role are not among them. */
export async function heldRights(conn: Connection = pool()): Promise<HeldRight[]> {
  const [rows] = await conn.raw(
    `SELECT privilege_type AS privilege, NULL AS \`table\` FROM information_schema.user_privileges WHERE grantee = ${GRANTEE}
     UNION SELECT privilege_type, NULL FROM information_schema.schema_privileges
       WHERE grantee = ${GRANTEE} AND DATABASE() LIKE table_schema
     UNION SELECT privilege_type, table_name FROM information_schema.table_privileges
       WHERE grantee = ${GRANTEE} AND table_schema = DATABASE()`,
  );
  return rows as HeldRight[];
}

/**
 * The rights that web and worker need and this connection's account lacks, by table: `interval_levels: ALTER, DROP`. None where the
 * account has a role, whose rights cannot be told apart here.
 */
export async function missingRights(conn: Connection = pool()): Promise<string[]> {
  const [[{ role }]] = (await conn.raw('SELECT CURRENT_ROLE() AS role')) as [[{ role: string | null }]];
  if (role !== null) return [];
  const held = new Set(
    (await heldRights(conn)).map(({ privilege, table }) => `${privilege} ${table ?? '*'}`),
  );
  const missing: string[] = [];
  for (const table of schemaTables()) {
    const lacks = appRightsOn(table).filter(
      (right) => !held.has(`${right} ${table}`) && !held.has(`${right} *`),
    );
    if (lacks.length > 0) missing.push(`${table}: ${lacks.join(', ')}`);
  }
  return missing;
}
