import { pool, type Connection } from './connection';

/** Rights with which acts could be changed or taken out of the audit trail. */
const TOO_WIDE = ['UPDATE', 'DELETE', 'DROP', 'ALTER', 'TRIGGER'];

/** Which of the rights of this connection's account let it change what the audit trail holds; none where it may only add to it. */
export async function auditRightsTooWide(conn: Connection = pool()): Promise<string[]> {
  const [rows] = await conn.raw(
    `SELECT privilege_type AS privilege FROM information_schema.user_privileges WHERE grantee = ${GRANTEE}
     UNION SELECT privilege_type FROM information_schema.schema_privileges
       WHERE grantee = ${GRANTEE} AND DATABASE() LIKE table_schema
     UNION SELECT privilege_type FROM information_schema.table_privileges
       WHERE grantee = ${GRANTEE} AND table_schema = DATABASE() AND table_name = 'audit_log'`,
  );
  const held = new Set((rows as { privilege: string }[]).map(({ privilege }) => privilege));
  return TOO_WIDE.filter((right) => held.has(right));
}

/** The account as these tables name it: `'bittern'@'127.0.0.1'`. */
const GRANTEE = `CONCAT("'", SUBSTRING_INDEX(CURRENT_USER(), '@', 1), "'@'", SUBSTRING_INDEX(CURRENT_USER(), '@', -1), "'")`;
