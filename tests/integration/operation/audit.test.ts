import { expect, test } from 'vitest';
import { db } from '#db/client';
import { appendAudit, findAuditBreak } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { useFreshSchema } from '../support/freshSchema';

useFreshSchema();

const entry = (subject: string) => ({
  userId: null,
  networkId: 1,
  action: 'station.edit',
  subject,
  detail: { name: ['Quay', 'Quay Head'] },
});

test('the chain holds after concurrent appends and shows where it was tampered with', async () => {
  await Promise.all(
    Array.from({ length: 12 }, (_, n) => inTransaction((trx) => appendAudit(entry(`station ${n}`), trx))),
  );
  expect(await findAuditBreak()).toBeNull();

  await db()('audit_log').where({ id: 5 }).update({ subject: 'station X' });
  expect(await findAuditBreak()).toBe(5);
});

test('a removed last row is noticed by the head', async () => {
  await db()('audit_log').delete();
  await db()('audit_head').update({ last_id: 0, last_digest: Buffer.alloc(32) });
  for (const n of [1, 2, 3]) await inTransaction((trx) => appendAudit(entry(`station ${n}`), trx));
  expect(await findAuditBreak()).toBeNull();

  await db()('audit_log').where({ id: 3 }).delete();
  expect(await findAuditBreak()).toBe(3);
});
