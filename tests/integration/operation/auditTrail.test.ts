import { spawnSync } from 'node:child_process';
import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { appendAudit, auditDigestAt, findAuditBreak } from '#db/queries/audit';
import { auditHead, listAudit } from '#db/queries/auditLog';
import { inTransaction } from '#db/queries/connection';
import { mailAuditHead } from '#ingest/jobs/mailAuditHead';
import { config } from '#lib/config/index';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';

useFreshSchema();

let session: string;

beforeAll(async () => {
  const network = await makeNetwork('merrow');
  session = (await makePerson(network, ['operator'])).session;
  for (const name of ['Quay limit', 'Yard 100% limit']) {
    const entry = { userId: null, networkId: network, action: 'limit.change', subject: 'limit 1' };
    await inTransaction((trx) =>
      appendAudit({ ...entry, detail: { before: { name: 'x' }, after: { name } } }, trx),
    );
  }
});

test('an act through the web tells where it came from, and the chain covers it', async () => {
  const made = await callApi('POST', '/api/v1/networks/merrow/webhooks', {
    session,
    clientAddress: '198.51.100.23',
    body: { url: 'https://alerts.quay.example/noise' },
  });
  expect(made.status).toBe(201);
  const [act] = await listAudit({ action: 'webhook.add' }, 1);
  expect(act?.fromAddress).toBe('198.51.100.23');
  expect(await findAuditBreak()).toBeNull();

  for (const address of ['198.51.100.24', null]) {
    await db()('audit_log').where({ id: act?.id }).update({ from_address: address });
    expect(await findAuditBreak()).toBe(act?.id);
  }
  await db()('audit_log').where({ id: act?.id }).update({ from_address: '198.51.100.23' });
  expect(await findAuditBreak()).toBeNull();
});

test('what Bittern does of itself has no address', async () => {
  const [act] = await listAudit({ action: 'limit.change' }, 1);
  expect(act?.fromAddress).toBeNull();
});

test('acts are found by their words, address and day', async () => {
  const found = async (filter: Parameters<typeof listAudit>[0]) => (await listAudit(filter, 10)).length;
  expect(await found({ text: 'quay LIMIT' })).toBe(1);
  expect(await found({ text: '100%' })).toBe(1);
  expect(await found({ text: '1%l' })).toBe(0);
  expect(await found({ text: '198.51.100.23' })).toBe(1);
  expect(await found({ text: '198.51' })).toBe(0);
  const now = Date.now();
  expect(await found({ fromAt: new Date(now - 60_000), toAt: new Date(now + 60_000) })).toBe(3);
  expect(await found({ toAt: new Date(now - 3_600_000) })).toBe(0);
});

test('the head is mailed once a day to whom the settings name', async () => {
  expect(await mailAuditHead(new Date())).toBe('nobody is named');
  config().auditHeadTo = 'keeper@merrow.example';
  const now = new Date('2026-03-01T00:00:20Z');
  const { position, sha256 } = await auditHead();
  expect(await mailAuditHead(now)).toBe(`act ${position}`);
  expect(await mailAuditHead(new Date('2026-03-01T19:00:00Z'))).toBe('was told before');
  expect(await mailAuditHead(new Date('2026-03-02T00:00:20Z'))).toBe(`act ${position}`);
  const mails = await db()('outbox').where({ kind: 'audit-head' }).select('recipient', 'text_body');
  expect(mails).toHaveLength(2);
  expect(mails[0]).toMatchObject({ recipient: 'keeper@merrow.example' });
  expect(mails[0].text_body).toContain(`${position}:${sha256}`);
});

function verify(...given: string[]) {
  const { status, stdout, stderr } = spawnSync(
    process.execPath,
    ['--import', 'tsx', 'ops/verifyAudit.ts', ...given],
    {
      encoding: 'utf8',
      env: process.env,
    },
  );
  return { status, said: stdout + stderr };
}

test('the command tells by its exit code whether the trail holds', async () => {
  const { position, sha256 } = await auditHead();
  expect(verify('--head', `${position}:${sha256}`)).toMatchObject({ status: 0 });
  expect(await auditDigestAt(0)).toBe('0'.repeat(64));
  expect(verify('--head', `${position}:${'ab'.repeat(32)}`)).toMatchObject({ status: 1 });
  expect(verify('--head', 'nonsense').status).toBe(2);
  await db()('audit_log').where({ id: 1 }).update({ subject: 'limit 2' });
  const broken = verify();
  expect(broken.status).toBe(1);
  expect(broken.said).toContain('act 1 does not fit');
}, 120_000);
