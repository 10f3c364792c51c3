import { closeDb, db } from '#db/client';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { config } from '#lib/config/index';
import { digestOlderContacts } from '#lib/services/complaints/desk/contactDigests';
import { SEALED_COLUMNS } from './sealedRows';

const DONE = 0;
const LEFT_OVER = 1;
const SETTINGS = 2;
const IN_USE = 4;
const CONTACTS_AT_ONCE = 200;

process.exitCode = await exchange(process.env['BITTERN_PERSONAL_DATA_KEY_BEFORE']).catch((error: unknown) => {
  console.error(`Broken off; call it again: ${error instanceof Error ? error.message : String(error)}`);
  return LEFT_OVER;
});
await closeDb();

/** Wraps whatever the earlier key opens under the settings' key. Each row by itself, so that it can be killed and called again. */
async function exchange(given: string | undefined): Promise<number> {
  if (!given || !/^[0-9a-f]{64}$/i.test(given)) {
    console.error(
      'BITTERN_PERSONAL_DATA_KEY_BEFORE: must be the earlier key, 64 hexadecimal digits (32 bytes)',
    );
    return SETTINGS;
  }
  const others = await otherConnections();
  if (others > 0) {
    console.error(`${others} other connections use ${config().database.name}: stop web and worker first.`);
    return IN_USE;
  }
  const before = Buffer.from(given, 'hex');
  const closed: string[] = [];
  const exchanged: Record<string, number> = {};
  for (const column of SEALED_COLUMNS) {
    exchanged[column.noun] = 0;
    for (const row of await column.rows()) {
      if (column.opens(row)) continue;
      try {
        await column.store(row, column.resealed(row, before));
        exchanged[column.noun] = (exchanged[column.noun] ?? 0) + 1;
      } catch {
        closed.push(`${column.noun} ${row.id}`);
      }
    }
  }
  if (closed.length > 0)
    console.error(`Neither key opens: ${closed.join(', ')}. They were left as they are.`);
  else await digestContacts();
  await inTransaction((transaction) =>
    appendAudit(
      {
        userId: null,
        networkId: null,
        action: 'personal-data-key.exchange',
        subject: 'key of personal data',
        detail: { exchanged, closed },
      },
      transaction,
    ),
  );
  for (const [noun, count] of Object.entries(exchanged)) console.log(`${noun}: ${count} wrapped anew`);
  return closed.length > 0 ? LEFT_OVER : DONE;
}

/** Digests by which a contact is recognised cannot be turned back: they are made anew from the data. */
async function digestContacts(): Promise<void> {
  await db()('complaint_contacts').delete();
  while ((await digestOlderContacts(CONTACTS_AT_ONCE)) > 0);
}

/** Connections of others to the database, as far as our account may see them. */
async function otherConnections(): Promise<number> {
  const [[row]] = await db().raw(
    'SELECT COUNT(*) AS count FROM information_schema.processlist WHERE db = DATABASE() AND id <> CONNECTION_ID()',
  );
  return Number(row.count);
}
