import { beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertMail, leaseDueMail } from '#db/queries/outbox';
import { messageIdOf } from '#lib/services/mails/messageId';
import { sendDueMail, type SenderSettings } from '#ingest/notify/sendOutbox';
import { useFreshSchema } from '../support/freshSchema';

useFreshSchema();

const MINUTE_MS = 60_000;
interface Handed {
  to: { address: string };
  messageId: string;
}
let handed: { to: string; messageId: string }[];

beforeEach(async () => {
  handed = [];
  await db()('outbox').delete();
});

async function put(key: string): Promise<void> {
  const mail = {
    messageId: messageIdOf(key),
    dedupeKey: key,
    networkId: 1,
    kind: 'exceedances',
    recipient: `${key}@people.example`,
    subject: 'Quay Head: above the limit',
    text: 'text',
    html: '<p>html</p>',
  };
  await inTransaction((transaction) => insertMail(mail, transaction));
}

function sender(holder: string, changes: Partial<SenderSettings> = {}): SenderSettings {
  const sendMail = async (mail: Handed) => handed.push({ to: mail.to.address, messageId: mail.messageId });
  return {
    transport: { sendMail } as never,
    from: 'bittern@merrow.example',
    holder,
    resolvers: {},
    random: () => 0.5,
    ...changes,
  };
}

const rows = () => db()('outbox').orderBy('id');

test('a message put twice for one cause is sent once', async () => {
  await put('a');
  await put('a');
  await sendDueMail(sender('one'), new Date());
  await sendDueMail(sender('one'), new Date());
  expect(handed).toEqual([{ to: 'a@people.example', messageId: messageIdOf('a') }]);
  expect(await rows()).toMatchObject([{ state: 'sent', attempts: 1 }]);
});

test('two senders never hand over the same message', async () => {
  for (let n = 0; n < 30; n += 1) await put(`m${n}`);
  const untilNoneIsDue = async (holder: string) => {
    while ((await sendDueMail(sender(holder), new Date())) > 0);
  };
  await Promise.all(['a', 'b', 'c', 'd', 'e', 'f'].map(untilNoneIsDue));
  expect(handed).toHaveLength(30);
  expect(new Set(handed.map(({ to }) => to)).size).toBe(30);
});

test('a sender whose clock is behind leaves to the other what that one holds', async () => {
  await put('held');
  const now = new Date();
  expect(await leaseDueMail('ahead', now, 150)).toBeDefined();
  for (const behindMs of [1, 1000, 60_000]) {
    expect(await leaseDueMail('behind', new Date(now.getTime() - behindMs), 150)).toBeUndefined();
  }
});

test('a failure waits longer each time, keeps its Message-ID, and is given up after five days', async () => {
  await put('b');
  const failing = sender('one', {
    transport: { sendMail: async () => Promise.reject(new Error('421 busy')) } as never,
  });
  let now = new Date();
  const waits: number[] = [];
  for (let attempt = 0; attempt < 8; attempt += 1) {
    await sendDueMail(failing, now);
    const [row] = await rows();
    waits.push((row.next_attempt_at.getTime() - now.getTime()) / MINUTE_MS);
    now = row.next_attempt_at;
  }
  expect(waits).toEqual([1, 2, 4, 8, 16, 32, 60, 60]);
  expect(await rows()).toMatchObject([
    { state: 'waiting', attempts: 8, last_error: '421 busy', message_id: messageIdOf('b') },
  ]);
  await sendDueMail(failing, new Date(Date.now() + 6 * 86_400_000));
  expect(await rows()).toMatchObject([{ state: 'dead' }]);
  await put('old');
  await db()('outbox')
    .where({ dedupe_key: 'old' })
    .update({ created_at: new Date(Date.now() - 6 * 86_400_000) });
  await sendDueMail(failing, new Date());
  expect((await rows())[1]).toMatchObject({ state: 'waiting', attempts: 1 });
});

test('waits are scattered by a fifth at most, so that a thousand messages do not come back in one second', async () => {
  const failing = { transport: { sendMail: async () => Promise.reject(new Error('421 busy')) } as never };
  const now = new Date();
  for (const [key, random] of [
    ['low', 0],
    ['high', 1],
  ] as const) {
    await put(key);
    await sendDueMail(sender('one', { ...failing, random: () => random }), new Date());
  }
  const waits = (await rows()).map((row) => Math.round((row.next_attempt_at - now.getTime()) / 1000));
  expect(Math.abs((waits[0] ?? 0) - 48)).toBeLessThan(3);
  expect(Math.abs((waits[1] ?? 0) - 72)).toBeLessThan(3);
});

test('a sender that dies between handing over and noting it repeats the message once, under the same Message-ID', async () => {
  await put('c');
  const dying = sender('dying', {
    transport: {
      sendMail: async (mail: Handed) => {
        handed.push({ to: mail.to.address, messageId: mail.messageId });
        // The lease passes to nobody: what this holder notes afterwards finds no row of its own.
        await db()('outbox').update({ lease_holder: 'gone' });
      },
    } as never,
  });
  await sendDueMail(dying, new Date());
  expect(await sendDueMail(sender('next'), new Date())).toBe(0);
  await sendDueMail(sender('next'), new Date(Date.now() + 3 * MINUTE_MS));
  expect(handed.map(({ messageId }) => messageId)).toEqual([messageIdOf('c'), messageIdOf('c')]);
  expect(await rows()).toMatchObject([{ state: 'sent' }]);
});

test('what the row does not hold is resolved by its kind; nothing to say any more ends it', async () => {
  const now = new Date();
  const row = (key: string) => ({
    message_id: `<${key}@x>`,
    dedupe_key: key,
    kind: 'complaint-reply',
    subject: 'Your noise report',
    complaint_reply_id: key === 'kept' ? 1 : 2,
    next_attempt_at: now,
    created_at: now,
  });
  await db()('outbox').insert([row('kept'), row('erased')]);
  const body = { to: 'resident@homes.example', subject: 's', text: 't', html: 'h' };
  const resolvers = {
    'complaint-reply': async (mail: { complaintReplyId: number | null }) =>
      mail.complaintReplyId === 1 ? body : null,
  };
  for (let round = 0; round < 2; round += 1) await sendDueMail(sender('one', { resolvers }), new Date());
  expect(handed).toEqual([{ to: 'resident@homes.example', messageId: '<kept@x>' }]);
  expect((await rows()).map(({ state }) => state)).toEqual(['sent', 'dead']);
  expect(JSON.stringify(await rows())).not.toContain('resident@homes');
});
