import { execFileSync } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { unzipSync } from 'fflate';
import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { findLatestDraft } from '#db/queries/summaryDrafts';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { addDueDrafts, makeWaitingMonth } from '#ingest/summaries/draftMonths';
import { watchIssuedMonths } from '#ingest/summaries/watchMonths';
import { monthDocumentSchema } from '#lib/contracts/monthDocument';
import { monthLifeSchema, type MonthLife } from '#lib/contracts/summaryLife';
import { summaryManifestSchema } from '#lib/contracts/summaryManifest';
import { actOnMonth, decideOnProposal } from '#lib/services/summaries/life/acts';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { issue, MONTH, must, network, storeLate, storeMarch } from './lifeSupport';

const dataDir = mkdtempSync(join(tmpdir(), 'bittern-life-'));
process.env['BITTERN_DATA_DIR'] = dataDir;
useFreshSchema();
vi.setConfig({ testTimeout: 240_000 });

const SUMMARIES = '/api/v1/networks/merrow/summaries';
let operator: { userId: string; session: string };
let regulator: { userId: string; session: string };
let quay: number;

beforeAll(async () => {
  const networkId = await makeNetwork('merrow');
  quay = await makeStation(networkId, 'MER-01', { name: 'Quay Head' });
  await makeStation(networkId, 'MER-02', { name: 'Silo Lane' });
  await db()('stations').update({ created_at: new Date('2026-01-01T00:00:00Z') });
  operator = await makePerson(networkId, ['operator']);
  regulator = await makePerson(networkId, ['regulator']);
  await storeMarch(quay, 5200);
  await aggregateAll(async () => {});
}, 120_000);

afterAll(() => {
  rmSync(dataDir, { recursive: true, force: true });
});

const get = (path: string, session = regulator.session) =>
  callApi('GET', `${SUMMARIES}/${path}`, { session });
const life = async () => monthLifeSchema.parse(await (await get(`${MONTH}/revisions`)).json()) as MonthLife;

describe('drafting', () => {
  test('begins when the days of grace are over, and two workers at once make one draft', async () => {
    expect(await addDueDrafts(new Date('2026-04-05T00:00:00Z'))).toBe(0);
    const due = new Date('2026-04-06T12:00:00Z');
    const added = await Promise.all([addDueDrafts(due), addDueDrafts(due), addDueDrafts(due)]);
    expect(added.reduce((sum, one) => sum + one, 0)).toBe(1);
    expect(await db()('summary_drafts').select('month', 'revision', 'state')).toEqual([
      { month: MONTH, revision: 1, state: 'draft' },
    ]);
    expect(await addDueDrafts(due)).toBe(0);
  });

  test('its figures are made once, also by two workers at once', async () => {
    const now = new Date('2026-04-06T12:01:00Z');
    const made = await Promise.all([makeWaitingMonth(now), makeWaitingMonth(now)]);
    expect(made.reduce((sum, one) => sum + one, 0)).toBe(1);
    const draft = await findLatestDraft((await network()).id, MONTH);
    expect(draft).toMatchObject({ state: 'draft', failure: null, progress: 0 });
    expect(draft?.figures?.map(({ code }) => code)).toEqual(['MER-01', 'MER-02']);
    expect(draft?.figures?.[1]).toMatchObject({ LAeq: null, coverage: 0 });
    expect(readdirSync(join(dataDir, 'summaries'))).toEqual([draft?.documentSha256?.toString('hex')]);
  });
});

describe('issuing', () => {
  const act = (body: object, session = operator.session) =>
    callApi('POST', `${SUMMARIES}/${MONTH}/acts`, { session, body });

  test('is for operators, and needs a review and a confirmation', async () => {
    expect((await act({ act: 'submit' }, regulator.session)).status).toBe(403);
    expect((await act({ act: 'issue', documentSha256: 'x', confirm: true })).status).toBe(409);
    expect((await act({ act: 'submit' })).status).toBe(200);
    expect((await act({ act: 'issue', documentSha256: 'x', confirm: false })).status).toBe(422);
    expect((await act({ act: 'issue', documentSha256: 'ab'.repeat(32), confirm: true })).status).toBe(422);
    const checks = await (await get(`${MONTH}/checks`, operator.session)).json();
    expect(checks.items.find(({ kind }: { kind: string }) => kind === 'coverage')).toMatchObject({
      isOpen: true,
      items: [{ path: expect.stringContaining('/stations/MER-02') }],
    });
    expect((await get(`${MONTH}/checks`)).status).toBe(403);
  });

  test('what changed between review and issue is looked at again', async () => {
    const { draft } = await life();
    const documentSha256 = draft?.documentSha256 ?? '';
    await storeLate(quay, '2026-03-12T10:00:00Z');
    expect((await act({ act: 'issue', documentSha256, confirm: true })).status).toBe(200);
    await makeWaitingMonth(new Date());
    const after = await findLatestDraft((await network()).id, MONTH);
    expect(after).toMatchObject({ state: 'review', failure: expect.stringContaining('have changed since') });
    expect(after?.documentSha256?.toString('hex')).not.toBe(documentSha256);
    expect(await db()('issued_summaries')).toEqual([]);
  });

  test('makes files, a signed manifest and a letter to the regulator', async () => {
    const { draft } = await life();
    const documentSha256 = draft?.documentSha256 ?? '';
    expect((await act({ act: 'issue', documentSha256, confirm: true, note: 'As reviewed.' })).status).toBe(
      200,
    );
    expect((await act({ act: 'draft' })).status).toBe(409);
    await makeWaitingMonth(new Date());
    const { revisions, draft: next } = await life();
    expect(next).toBeNull();
    expect(revisions).toMatchObject([
      { revision: 1, isSuperseded: false, note: 'As reviewed.', changes: null },
    ]);
    expect(revisions[0]?.files.map(({ format }) => format).sort()).toEqual(['csv', 'json', 'pdf', 'xlsx']);
    const mails = await db()('outbox').where({ kind: 'summary' }).select('recipient', 'subject');
    expect(mails).toHaveLength(1);
    expect(mails[0].subject).toContain('March 2026 is issued');
    expect(await findAuditBreak()).toBeNull();
  });

  test('the files are served as they were sealed, to scripts too', async () => {
    const manifest = summaryManifestSchema.parse(await (await get(`${MONTH}.manifest.json`)).json());
    expect(manifest.data.stations.map(({ code, intervals }) => [code, intervals > 0])).toEqual([
      ['MER-01', true],
      ['MER-02', false],
    ]);
    const made = await callApi('POST', '/api/v1/me/tokens', {
      session: regulator.session,
      body: { name: 'script', days: 30 },
    });
    const { token } = (await made.json()) as { token: string };
    for (const { format, sha256, bytes } of manifest.files) {
      const answer = await callApi('GET', `${SUMMARIES}/${MONTH}.${format}`, { token });
      const body = Buffer.from(await answer.arrayBuffer());
      expect([answer.status, answer.headers.get('bittern-revision'), body.length]).toEqual([200, '1', bytes]);
      const verdict = await callApi('GET', `/api/v1/summaries/verify?sha256=${sha256}`);
      expect(await verdict.json()).toMatchObject({
        verdict: 'issued',
        matches: [{ month: MONTH, isSealIntact: true }],
      });
    }
    const json = monthDocumentSchema.parse(await (await get(`${MONTH}.json`)).json());
    expect(json.stations.map(({ code }) => code)).toEqual(['MER-01', 'MER-02']);
    const zip = await get(`archive.zip?month=${MONTH}&format=pdf`);
    const names = Object.keys(unzipSync(new Uint8Array(await zip.arrayBuffer())));
    expect(names).toEqual([
      'merrow-2026-03-r1.pdf',
      'merrow-2026-03-r1.manifest.json',
      'merrow-2026-03-r1.manifest.sig',
      'merrow-2026-03-r1.key.pem',
    ]);
  });

  test('nothing of it can be changed, nor issued twice', async () => {
    for (const table of ['issued_summaries', 'issued_summary_files']) {
      await expect(db()(table).delete()).rejects.toThrow('What is issued is never changed');
    }
    await expect(db()('issued_summaries').update({ note: 'x' })).rejects.toThrow('never changed');
    await expect(db()('issued_summary_files').update({ name: 'x' })).rejects.toThrow('never changed');
    expect((await act({ act: 'discard' })).status).toBe(409);
  });
});

describe('revising', () => {
  test('nothing is proposed while nothing changes', async () => {
    await aggregateAll(async () => {});
    await watchIssuedMonths(new Date());
    expect((await life()).proposals).toEqual([]);
    expect(await watchIssuedMonths(new Date())).toBe(0);
  });

  test('late data make a proposal that lists every figure that changed, and why', async () => {
    await storeLate(quay, '2026-03-12T12:00:00Z');
    await aggregateAll(async () => {});
    expect(await watchIssuedMonths(new Date())).toBe(1);
    const [proposal] = (await life()).proposals;
    const changeOf = (figure: string) => proposal?.changes.find((change) => change.figure === figure);
    expect(changeOf('figures LAFmax')).toBeUndefined();
    expect(changeOf('figures Lday')).toMatchObject({
      station: 'MER-01',
      why: [expect.stringContaining('60 intervals')],
    });
    expect(changeOf('days 2026-03-12 Lday')?.old).not.toBeNull();
    expect(changeOf('days 2026-03-20 Lday')).toBeUndefined();
    expect(changeOf('hours 2026-03-12 12:00 LAeq')).toMatchObject({ old: null, new: 75 });
    expect(proposal?.changes.some(({ station }) => station === 'MER-02')).toBe(false);
    expect(await watchIssuedMonths(new Date())).toBe(0);
  });

  test('a dismissed proposal stays dismissed; other changes are proposed anew', async () => {
    const actor = { network: await network(), month: MONTH, userId: operator.userId };
    const [first] = (await life()).proposals;
    must(await decideOnProposal(actor, first?.id ?? 0, { decision: 'dismiss', reason: 'Too little.' }));
    expect((await decideOnProposal(actor, first?.id ?? 0, { decision: 'accept', reason: 'x' })).kind).toBe(
      'before',
    );
    await db()('summary_drafts').update({ fingerprint: null });
    expect(await watchIssuedMonths(new Date())).toBe(1);
    expect((await life()).proposals.map(({ state }) => state)).toEqual(['dismissed']);
    const answer = await callApi('POST', '/api/v1/networks/merrow/exclusions', {
      session: operator.session,
      body: {
        station: 'MER-01',
        from: '2026-03-20T08:00:00Z',
        to: '2026-03-20T10:00:00Z',
        reason: 'Works beside the mast',
      },
    });
    expect(answer.status).toBe(201);
    await aggregateAll(async () => {});
    expect(await watchIssuedMonths(new Date())).toBe(1);
    const [second] = (await life()).proposals;
    expect(second?.state).toBe('open');
    const day = second?.changes.find(({ figure }) => figure === 'days 2026-03-20 Lday');
    expect(day?.why).toEqual([expect.stringContaining('left out: Works beside the mast')]);
    must(
      await decideOnProposal(actor, second?.id ?? 0, { decision: 'accept', reason: 'It has to be right.' }),
    );
  });

  test('revision 2 supersedes 1, which stays as it was; and so does 3', async () => {
    const before = Buffer.from(await (await get(`${MONTH}.pdf`)).arrayBuffer());
    expect(await issue(operator.userId, 'Late data.')).toBe(2);
    const old = await get(`${MONTH}.pdf?revision=1`);
    expect(old.headers.get('bittern-superseded')).toBe('2');
    expect(Buffer.from(await old.arrayBuffer()).equals(before)).toBe(true);
    const { revisions } = await life();
    expect(revisions.map(({ revision, isSuperseded }) => [revision, isSuperseded])).toEqual([
      [2, false],
      [1, true],
    ]);
    expect(revisions[0]?.changes?.length).toBeGreaterThan(5);
    const sha256 = revisions[1]?.files[0]?.sha256 ?? '';
    const verdict = await callApi('GET', `/api/v1/summaries/verify?sha256=${sha256}`);
    expect(await verdict.json()).toMatchObject({ verdict: 'superseded', matches: [{ latestRevision: 2 }] });

    await storeLate(quay, '2026-03-12T15:00:00Z');
    await aggregateAll(async () => {});
    expect(await issue(operator.userId)).toBe(3);
    const manifest = await (await get(`${MONTH}/manifest`)).json();
    expect(manifest).toMatchObject({ revision: 3, supersedes: { revision: 2 } });
    const list = await (await callApi('GET', SUMMARIES, { session: regulator.session })).json();
    expect(list.items.find(({ month }: { month: string }) => month === MONTH)).toMatchObject({
      state: 'issued',
      revision: 3,
      revisions: [3, 2, 1],
    });
  });

  test('a revision that is being made can be given up', async () => {
    const actor = { network: await network(), month: MONTH, userId: operator.userId };
    must(await actOnMonth(actor, { act: 'draft' }));
    expect((await life()).draft).toMatchObject({ revision: 4, state: 'draft' });
    must(await actOnMonth(actor, { act: 'discard' }));
    expect((await life()).draft).toBeNull();
  });
});

test('the verifier needs no server: it takes what is right and catches one flipped byte in each part', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'bittern-verify-'));
  const zip = await get(`archive.zip?month=${MONTH}`);
  const parts = unzipSync(new Uint8Array(await zip.arrayBuffer()));
  const nameOf = (ending: string) => Object.keys(parts).find((name) => name.endsWith(ending)) ?? '';
  const seal = ['manifest.json', 'manifest.sig', 'key.pem'].map(nameOf);
  const files = Object.keys(parts).filter((name) => !seal.includes(name));
  const run = () => {
    try {
      const paths = [...seal, ...files].map((name) => join(folder, name));
      return {
        code: 0,
        out: execFileSync('node', ['ops/verify/verify.mjs', ...paths], { encoding: 'utf8' }),
      };
    } catch (error) {
      const { status, stdout } = error as { status: number; stdout: string };
      return { code: status, out: stdout };
    }
  };
  for (const [name, bytes] of Object.entries(parts)) writeFileSync(join(folder, name), bytes);
  expect(run()).toMatchObject({ code: 0, out: expect.stringContaining('Everything is right') });
  for (const name of [...files, nameOf('manifest.json'), nameOf('manifest.sig')]) {
    const flipped = Uint8Array.from(parts[name] ?? []);
    const where = Math.floor(flipped.length / 2);
    flipped[where] = (flipped[where] ?? 0) ^ 1;
    writeFileSync(join(folder, name), flipped);
    expect(run().code, name).toBe(1);
    writeFileSync(join(folder, name), parts[name] ?? new Uint8Array());
  }
  rmSync(folder, { recursive: true });
});

describe('our own records', () => {
  test('a file whose bytes were changed is not given out', async () => {
    const [{ files = [] } = {}] = (await life()).revisions;
    const { sha256 = '' } = files.find(({ format }) => format === 'pdf') ?? {};
    const path = join(dataDir, 'summaries', sha256);
    const bytes = Buffer.from(await (await get(`${MONTH}.pdf`)).arrayBuffer());
    const flipped = Buffer.from(bytes);
    flipped[100] = (flipped[100] ?? 0) ^ 1;
    writeFileSync(path, flipped);
    expect((await get(`${MONTH}.pdf`)).status).toBe(500);
    writeFileSync(path, bytes);
    expect((await get(`${MONTH}.pdf`)).status).toBe(200);
  });

  test('a manifest that was changed in the database, past its guard, is told to be damaged', async () => {
    const { sha256 = '' } = (await life()).revisions[0]?.files[0] ?? {};
    const text: string = (await db()('issued_summaries').where({ revision: 3 }).first('manifest')).manifest;
    await db().raw('DROP TRIGGER issued_summaries_update');
    await db()('issued_summaries')
      .where({ revision: 3 })
      .update({ manifest: text.replace('Network', 'Netvork') });
    const verdict = await callApi('GET', `/api/v1/summaries/verify?sha256=${sha256}`);
    expect(await verdict.json()).toMatchObject({ verdict: 'damaged' });
    expect((await get(`${MONTH}/manifest`)).status).toBe(500);
    await db()('issued_summaries').where({ revision: 3 }).update({ manifest: text });
    expect((await get(`${MONTH}/manifest`)).status).toBe(200);
  });

  test('a key that is replaced stays published, and what it signed holds', async () => {
    const admin = await makePerson(null, [], true);
    const rotate = (session: string) => callApi('POST', '/api/v1/networks/merrow/summary-keys', { session });
    expect((await rotate(operator.session)).status).toBe(403);
    expect((await rotate(admin.session)).status).toBe(200);
    const { items } = await (await callApi('GET', '/api/v1/summaries/keys?network=merrow')).json();
    expect(items.map(({ retiredAt }: { retiredAt: string | null }) => retiredAt === null)).toEqual([
      true,
      false,
    ]);
    expect((await get(`${MONTH}/manifest`)).status).toBe(200);
    const pem = await callApi('GET', `/api/v1/summaries/keys/${items[1].sha256}`);
    expect(await pem.text()).toBe(items[1].pem);
    expect((await callApi('GET', '/api/v1/summaries/keys?network=other')).status).toBe(404);
  });
});

test('an unknown digest, and one that is none', async () => {
  const ask = (sha256: string) => callApi('GET', `/api/v1/summaries/verify?sha256=${sha256}`);
  expect(await (await ask('ab'.repeat(32))).json()).toMatchObject({ verdict: 'unknown', matches: [] });
  expect((await ask('abc')).status).toBe(400);
});

test('the trend has the latest revision of each month', async () => {
  const { items } = await (await get('trend')).json();
  expect(items).toMatchObject([
    { month: MONTH, revision: 3, stations: [{ code: 'MER-01' }, { code: 'MER-02', Lden: null }] },
  ]);
  const lines = (await (await get('trend.csv')).text()).trim().split('\r\n');
  expect(lines).toHaveLength(3);
});
