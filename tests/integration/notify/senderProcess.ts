import { closeDb } from '#db/client';
import { sendDueMail } from '#ingest/notify/sendOutbox';
import { makeTransport } from '#ingest/notify/transport';
import { config } from '#lib/config/index';

/** Sends one due message in a process of its own, for a test to kill. */
const transport = makeTransport(config());
await sendDueMail({ transport, from: 'bittern@merrow.example', holder: 'child', resolvers: {} }, new Date());
await closeDb();
