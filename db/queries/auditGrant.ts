import { heldRights } from './accountRights';
import { pool, type Connection } from './connection';

/** Rights with which acts could be changed or taken out of the audit trail. */
const TOO_WIDE = ['UPDATE', 'DELETE', 'DROP', 'ALTER', 'TRIGGER'];

/** Which of the rights of this connection's account let it change what the audit trail holds; none where it may only add to it. */
export async function auditRightsTooWide(conn: Connection = pool()): Promise<string[]> {
  const onTrail = (await heldRights(conn)).filter(({ table }) => table === null || table === 'audit_log');
  const held = new Set(onTrail.map(({ privilege }) => privilege));
  return TOO_WIDE.filter((right) => held.has(right));
}
