import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findComplaint } from '#db/queries/complaints';
import { findNetworkBySlug, listSettings, pickSettings, type NetworkRow } from '#db/queries/networks';
import type { Evidence } from '#lib/contracts/complaintEvidence';
import type { Complaint, Reply } from '#lib/contracts/complaints';
import { openAnswerDesk } from '#lib/services/complaints/answer/answerDesk';
import {
  approveAnswer,
  returnAnswer,
  sendAnswer,
  submitAnswer,
} from '#lib/services/complaints/answer/decideAnswer';
import { USUAL_ITEMS } from '#lib/services/complaints/answer/items';
import { keepAnswer } from '#lib/services/complaints/answer/keepAnswer';
import { submittedAnswers } from '#lib/services/complaints/answer/submittedAnswers';
import { erasePersonalData } from '#lib/services/complaints/closeComplaint';
import { notePosted, resendReply } from '#lib/services/complaints/deliverReply';
import { STANDARD_LETTER } from '#lib/services/complaints/letter/draftReply';
import { openCase } from '#lib/services/complaints/openCase';
import { changedFigures } from '#lib/services/complaints/pack/changedFigures';
import { gatherPack } from '#lib/services/complaints/pack/gatherPack';
import { fileMessage, noteReceived, withdrawFiled } from '#lib/services/complaints/received/fileReceived';
import { resolveComplaintReply } from '#lib/services/complaints/replyMessage';
import { changeAnswering } from '#lib/services/complaints/templates/answering';
import {
  keepTemplate,
  offeredTemplates,
  withdrawTemplate,
} from '#lib/services/complaints/templates/templates';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { at, storeMinutes } from './support';

useFreshSchema();

const COMPLAINTS = '/api/v1/networks/merrow/complaints';
const report = {
  from: '2026-03-17T03:10:00Z',
  to: '2026-03-17T03:40:00Z',
  kind: 'hum',
  latitude: 54.10312,
  longitude: 1.60277,
  words: 'Like a fridge in the wall.',
  contact: { name: 'Ada Wren', email: 'ada@wren.example', phone: null, address: '3 Tern Row' },
};

let network: NetworkRow;
let stationId: number;
let writer: { userId: string; session: string };
let second: { userId: string; session: string };
let regulator: { userId: string; session: string };

beforeAll(async () => {
  const id = await makeNetwork('merrow');
  stationId = await makeStation(id, 'MER-04', { latitude: 54.105, longitude: 1.606 });
  await makeStation(id, 'MER-01', { latitude: 54.2, longitude: 1.6 });
  writer = await makePerson(id, ['liaison']);
  second = await makePerson(id, ['liaison']);
  regulator = await makePerson(id, ['regulator']);
  const found = await findNetworkBySlug('merrow');
  if (!found) throw new Error('The network is not there.');
  network = found;
  await storeMinutes(stationId, at('2026-03-17T02:00:00Z'), at('2026-03-17T04:30:00Z'), (startSec) => ({
    laeqCentiDb: (startSec / 60) % 2 === 0 ? 5000 : 6000,
    bandCentiDb: (index) => (index === -10 ? 6200 : 4000),
  }));
  for (let week = 1; week <= 8; week += 1) {
    const start = at(report.from) - week * 7 * 86_400;
    await storeMinutes(stationId, start, start + 1800, () => ({ laeqCentiDb: 4000 + 100 * week }));
  }
});

async function log(changes: Record<string, unknown> = {}): Promise<string> {
  const answer = await callApi('POST', COMPLAINTS, {
    session: writer.session,
    body: { ...report, ...changes },
  });
  expect(answer.status).toBe(201);
  return ((await answer.json()) as { complaint: Complaint }).complaint.reference;
}

const detail = async (reference: string, session = writer.session) =>
  (await (await callApi('GET', `${COMPLAINTS}/${reference}`, { session })).json()) as {
    evidence: Evidence;
    replies: Reply[];
    status: string;
  };

const keep = (reference: string, body: string, revision = 0, userId = writer.userId) =>
  keepAnswer(userId, network, reference, { body, items: USUAL_ITEMS, templateVersionId: null, revision });

const act = (userId: string, reference: string, revision = 1) => ({ userId, network, reference, revision });

async function textOf(pdf: Uint8Array): Promise<string> {
  const folder = await mkdtemp(join(tmpdir(), 'letter-'));
  try {
    await writeFile(join(folder, 'letter.pdf'), pdf);
    const { stdout } = await promisify(execFile)('pdftotext', ['-layout', join(folder, 'letter.pdf'), '-']);
    return stdout;
  } finally {
    await rm(folder, { recursive: true });
  }
}

describe('the pack', () => {
  test('is the same for the same question, whoever asks and whenever', async () => {
    const complaint = await findComplaint(network.id, await log());
    if (!complaint) throw new Error('It is not there.');
    const place = { latitude: report.latitude, longitude: report.longitude };
    const nowSec = at('2026-04-20T10:00:00Z');
    const first = await gatherPack({ network, complaint, place, nowSec });
    const later = await gatherPack({ network, complaint, place, nowSec: nowSec + 86_400 });
    expect(later).toEqual(first);
    expect(first.evidence.stations[0]?.context).toMatchObject({ rank: 100, uncertainty: 1 });
    expect(first.evidence.stations[0]?.usual).toMatchObject({ weeks: 8, validWeeks: 8, median: 44.5 });
    expect(first.standings).toMatchObject([
      { station: 'MER-04', verdict: 'near', wind: 'north-east' },
      { station: 'MER-01', verdict: 'no-data' },
    ]);
  });

  test('counts other reports nearby and around then, and tells no more of them', async () => {
    await db()('complaints').delete();
    const reference = await log();
    await log({ kind: 'whine', from: '2026-03-17T12:00:00Z', to: '2026-03-17T12:30:00Z' });
    await log({ latitude: 54.5 });
    await log({ from: '2026-03-20T03:10:00Z', to: '2026-03-20T03:40:00Z' });
    const desk = await openAnswerDesk(writer.userId, network, reference, new Date());
    expect(desk?.pack.reports).toEqual({ withinHours: 12, withinKm: 2, count: 1, sameKind: 0 });
  });
});

describe('the PDF', () => {
  test('carries the figures that the interface gives, and is kept as it was sent', async () => {
    const reference = await log();
    expect((await keep(reference, STANDARD_LETTER)).kind).toBe('kept');
    const { evidence } = await detail(reference);
    expect(await sendAnswer(act(writer.userId, reference), evidence.digest, new Date())).toEqual({
      kind: 'done',
    });

    const { replies } = await detail(reference);
    const [reply] = replies;
    const path = `${COMPLAINTS}/${reference}/replies/${reply?.id}/letter`;
    const answer = await callApi('GET', path, { session: writer.session });
    expect(answer.headers.get('content-type')).toBe('application/pdf');
    const pdf = new Uint8Array(await answer.arrayBuffer());
    const text = (await textOf(pdf)).replace(/\s+/g, ' ');
    const [nearest] = evidence.stations;
    for (const level of [
      nearest?.LAeq,
      nearest?.LAFmax,
      nearest?.LA10,
      nearest?.LA90,
      nearest?.usual.median,
    ]) {
      expect(text).toContain(level?.toFixed(1));
    }
    expect(text).toContain('3 Tern Row');
    expect(text).toContain(`Our reference ${reference}`);
    expect(text).toContain(evidence.digest);
    const message = await resolveComplaintReply(reply?.id ?? 0);
    expect(message?.attachments[0]?.content.equals(pdf)).toBe(true);
    for (const session of [regulator.session, (await makePerson(network.id, ['operator'])).session]) {
      expect((await callApi('GET', path, { session })).status).toBe(403);
    }
  });

  test('leaves out what was dropped', async () => {
    const reference = await log();
    const items = ['levels'] as const;
    await keepAnswer(writer.userId, network, reference, {
      body: STANDARD_LETTER,
      items,
      templateVersionId: null,
      revision: 0,
    });
    const preview = await callApi('GET', `${COMPLAINTS}/${reference}/answer`, { session: writer.session });
    const text = await textOf(new Uint8Array(await preview.arrayBuffer()));
    expect(text).toContain('Levels');
    expect(text).not.toContain('Against the usual');
    expect(text).not.toContain('Weather and the instrument');
    const refused = await callApi('GET', `${COMPLAINTS}/${reference}/answer`, { session: regulator.session });
    expect(refused.status).toBe(403);
  });

  test('a letter of a reply is not reached by another complaint', async () => {
    const [one, other] = [await log(), await log()];
    await keep(one, STANDARD_LETTER);
    await sendAnswer(act(writer.userId, one), (await detail(one)).evidence.digest, new Date());
    const id = (await detail(one)).replies[0]?.id;
    const answer = await callApi('GET', `${COMPLAINTS}/${other}/replies/${id}/letter`, {
      session: writer.session,
    });
    expect(answer.status).toBe(404);
  });
});

describe('what may not be sent', () => {
  test.each([
    ['an unknown field', 'It was {{loudness}}. {{measured}}', 'unknown field {{loudness}}'],
    ['a level typed by hand', 'It was 43,1 dB(A). {{measured}}', 'typed by hand'],
    ['an open field', 'It was {{laeq. {{measured}}', 'not closed'],
    ['a figure without what belongs to it', 'It was {{laeq}}.', 'put {{measured}} in'],
  ])('%s', async (_, text, told) => {
    const reference = await log();
    const answer = await callApi('POST', `${COMPLAINTS}/${reference}/replies`, {
      session: writer.session,
      body: { text },
    });
    expect(answer.status).toBe(422);
    expect(JSON.stringify(await answer.json())).toContain(told);
    await keep(reference, text);
    const sent = await sendAnswer(
      act(writer.userId, reference),
      (await detail(reference)).evidence.digest,
      new Date(),
    );
    expect(sent).toMatchObject({ kind: 'refused', message: expect.stringContaining(told) });
    expect((await detail(reference)).status).toBe('open');
  });
});

describe('later data', () => {
  test('what was sent stands beside what is now, figure by figure', async () => {
    const window = { from: '2026-03-18T03:10:00Z', to: '2026-03-18T03:40:00Z' };
    await storeMinutes(stationId, at(window.from), at(window.to), () => ({ laeqCentiDb: 5000 }));
    const reference = await log(window);
    await callApi('POST', `${COMPLAINTS}/${reference}/replies`, {
      session: writer.session,
      body: { text: STANDARD_LETTER },
    });
    const sent = (await detail(reference)).replies[0]?.figures;
    await db()('exclusions').insert({
      network_id: network.id,
      station_id: stationId,
      starts_at: at(window.from),
      ends_at: at(window.from) + 600,
      reason: 'grass was cut',
      created_by: writer.userId,
      created_at: new Date(),
    });
    const after = await detail(reference);
    expect(after.replies[0]?.figures).toEqual(sent);
    expect(sent && changedFigures(sent, after.evidence)).toEqual(
      expect.arrayContaining([
        expect.objectContaining({ figure: 'Coverage', sent: '100.00', now: '66.67' }),
        expect.objectContaining({ figure: 'Exclusions', sent: '0', now: '1' }),
      ]),
    );
    expect(changedFigures(after.evidence, after.evidence)).toEqual([]);
  });
});

describe('four eyes', () => {
  beforeAll(() =>
    changeAnswering(
      { networkId: network.id, userId: writer.userId },
      { needsApproval: true, replyAddress: 'desk+{reference}@merrow.example' },
    ),
  );

  test('a second person approves; the author cannot, and nothing goes past it', async () => {
    const reference = await log();
    await keep(reference, STANDARD_LETTER);
    const { digest } = (await detail(reference)).evidence;
    expect(await sendAnswer(act(writer.userId, reference), digest, new Date())).toMatchObject({
      kind: 'refused',
    });
    const direct = await callApi('POST', `${COMPLAINTS}/${reference}/replies`, {
      session: writer.session,
      body: { text: STANDARD_LETTER },
    });
    expect(direct.status).toBe(409);
    expect(await submitAnswer(act(writer.userId, reference), new Date())).toEqual({ kind: 'done' });
    expect(await keep(reference, 'Dear …', 1)).toEqual({ kind: 'submitted' });
    expect((await submittedAnswers(network.id, second.userId)).get(reference)?.isOwn).toBe(false);
    expect((await submittedAnswers(network.id, writer.userId)).get(reference)?.isOwn).toBe(true);
    const csvOf = async (session: string, status = 'to-approve') =>
      (await callApi('GET', `${COMPLAINTS}.csv?status=${status}`, { session })).text();
    const listed = (await csvOf(second.session)).trim().split('\r\n').slice(1);
    expect(listed.map((line) => line.split(',')[0])).toEqual([reference]);
    expect(await csvOf(regulator.session)).toBe(await csvOf(regulator.session, 'open'));
    expect(await approveAnswer(act(writer.userId, reference), new Date())).toMatchObject({ kind: 'refused' });
    expect((await detail(reference)).replies).toEqual([]);
    expect(await approveAnswer(act(second.userId, reference), new Date())).toEqual({ kind: 'done' });
    expect(await submittedAnswers(network.id, second.userId)).toEqual(new Map());
    expect((await csvOf(second.session)).trim().split('\r\n')).toHaveLength(1);
    const [reply] = (await detail(reference)).replies;
    const names = await db()('users').whereIn('id', [writer.userId, second.userId]).select('id', 'name');
    const nameOf = (userId: string) => names.find(({ id }) => id === userId)?.name;
    expect(reply).toMatchObject({ sentBy: nameOf(writer.userId), approvedBy: nameOf(second.userId) });
    expect(await resolveComplaintReply(reply?.id ?? 0)).toMatchObject({
      replyTo: { address: `desk+${reference}@merrow.example` },
    });
  });

  test('taken back it can be written on; given back by the second person too', async () => {
    const reference = await log();
    await keep(reference, STANDARD_LETTER);
    await submitAnswer(act(writer.userId, reference), new Date());
    expect(await returnAnswer(act(writer.userId, reference))).toEqual({ kind: 'done' });
    expect(await keep(reference, `${STANDARD_LETTER}\n\nP.S.`, 1)).toEqual({ kind: 'kept', revision: 2 });
    await submitAnswer(act(writer.userId, reference, 2), new Date());
    expect(await returnAnswer(act(second.userId, reference, 2))).toEqual({ kind: 'done' });
    expect(await approveAnswer(act(second.userId, reference, 2), new Date())).toMatchObject({
      kind: 'refused',
    });
  });

  test('figures that changed since it was submitted stop the approval', async () => {
    const window = { from: '2026-03-19T03:10:00Z', to: '2026-03-19T03:40:00Z' };
    const reference = await log(window);
    await keep(reference, STANDARD_LETTER);
    await submitAnswer(act(writer.userId, reference), new Date());
    await storeMinutes(stationId, at(window.from), at(window.to), () => ({ laeqCentiDb: 5200 }));
    const outcome = await approveAnswer(act(second.userId, reference), new Date());
    expect(outcome).toMatchObject({
      kind: 'refused',
      message: expect.stringContaining('figures have changed'),
    });
  });

  test('of two who keep a text at once the second is told', async () => {
    const reference = await log();
    const both = await Promise.all([
      keep(reference, 'One {{measured}}'),
      keep(reference, 'Two {{measured}}', 0, second.userId),
    ]);
    expect(both.map(({ kind }) => kind).sort()).toEqual(['changed-meanwhile', 'kept']);
  });
});

describe('delivery', () => {
  beforeAll(() =>
    changeAnswering(
      { networkId: network.id, userId: writer.userId },
      { needsApproval: false, replyAddress: null },
    ),
  );

  const reply = async (reference: string) => {
    await callApi('POST', `${COMPLAINTS}/${reference}/replies`, {
      session: writer.session,
      body: { text: STANDARD_LETTER },
    });
    const { replies } = await detail(reference);
    return replies.at(-1);
  };

  test('a letter on paper is noted as posted, and the note is taken back', async () => {
    const reference = await log({ contact: { name: 'Ada Wren', address: '3 Tern Row' } });
    const sent = await reply(reference);
    const who = { userId: writer.userId, network, reference, replyId: sent?.id ?? 0 };
    expect(await notePosted(who, '2026-03-20')).toEqual({ kind: 'done' });
    expect((await detail(reference)).replies[0]).toMatchObject({
      delivery: 'posted',
      postedOn: '2026-03-20',
    });
    expect(await notePosted(who, '2026-03-21')).toMatchObject({ kind: 'refused' });
    expect(await notePosted(who, null)).toEqual({ kind: 'done' });
    expect((await detail(reference)).replies[0]?.delivery).toBe('letter');
    expect(await resendReply(who, new Date())).toMatchObject({ kind: 'refused' });
  });

  test('what a mail server refused says why, and is sent again under the same Message-ID', async () => {
    const reference = await log();
    const sent = await reply(reference);
    const mail = () => db()('outbox').where({ complaint_reply_id: sent?.id });
    await mail().update({ state: 'dead', attempts: 9, last_error: 'Not delivered, EENVELOPE, 550' });
    expect((await detail(reference)).replies[0]).toMatchObject({
      delivery: 'dead',
      failure: 'Not delivered, EENVELOPE, 550',
      attempts: 9,
    });
    const before = await mail().first('message_id');
    const who = { userId: writer.userId, network, reference, replyId: sent?.id ?? 0 };
    expect(await resendReply(who, new Date())).toEqual({ kind: 'done' });
    expect(await mail().first('state', 'message_id')).toMatchObject({ state: 'waiting', ...before });
  });

  test('a second reply names the first one’s Message-ID', async () => {
    const reference = await log();
    const first = await reply(reference);
    const later = await reply(reference);
    const { message_id: messageId } = await db()('outbox')
      .where({ complaint_reply_id: first?.id })
      .first('message_id');
    expect(await resolveComplaintReply(later?.id ?? 0)).toMatchObject({ references: [messageId] });
  });
});

describe('answers received', () => {
  const eml = (subject: string, id: string) =>
    Buffer.from(
      `From: Ada Wren <ada@wren.example>\r\nTo: desk@merrow.example\r\nSubject: ${subject}\r\nMessage-ID: <${id}@wren.example>\r\n` +
        'Date: Fri, 20 Mar 2026 18:00:00 +0000\r\nContent-Type: text/plain; charset=utf-8\r\n\r\nIt was back last night.\r\n',
    );

  test('are filed under the reference once, sealed, and withdrawn', async () => {
    const reference = await log();
    const who = { userId: writer.userId, network, reference };
    const message = eml(`Re: Your noise report ${reference}`, 'one');
    expect(await fileMessage(who, message)).toEqual({ kind: 'done' });
    expect(await fileMessage(who, message)).toMatchObject({ kind: 'refused' });
    expect(
      await noteReceived(who, 'She rang: still there.', new Date('2026-03-21T09:00:00Z'), new Date()),
    ).toEqual({ kind: 'done' });
    const rows = await db()('complaint_received').select('id', 'ciphertext');
    for (const { ciphertext } of rows) expect(ciphertext.includes('last night')).toBe(false);
    const settings = pickSettings(await listSettings(network.id), at(report.from));
    const open = (userId: string, mayReadPersonalData: boolean) =>
      openCase({ userId, mayReadPersonalData, network, settings }, reference, new Date());
    expect((await open(writer.userId, true))?.received).toMatchObject([
      {
        source: 'message',
        from: expect.stringContaining('ada@wren.example'),
        text: 'It was back last night.',
      },
      { source: 'note', text: 'She rang: still there.' },
    ]);
    expect((await open(regulator.userId, false))?.received).toEqual([]);
    expect(await withdrawFiled(who, rows[0].id)).toEqual({ kind: 'done' });
    expect((await open(writer.userId, true))?.received).toHaveLength(1);
  });

  test('one that answers another report is refused, and so is what is no message', async () => {
    const who = { userId: writer.userId, network, reference: await log() };
    expect(await fileMessage(who, eml('Re: Your noise report MER-2026-9999', 'two'))).toMatchObject({
      kind: 'refused',
      message: expect.stringContaining('MER-2026-9999'),
    });
    expect(await fileMessage(who, Buffer.from([0x89, 0x50, 0x4e, 0x47]))).toMatchObject({ kind: 'refused' });
  });

  test('erasure destroys letters, answers being written and answers received', async () => {
    const reference = await log();
    await keep(reference, STANDARD_LETTER);
    await noteReceived({ userId: writer.userId, network, reference }, 'Word.', new Date(), new Date());
    await callApi('POST', `${COMPLAINTS}/${reference}/replies`, {
      session: writer.session,
      body: { text: STANDARD_LETTER },
    });
    const complaint = await findComplaint(network.id, reference);
    if (!complaint) throw new Error('It is not there.');
    await erasePersonalData(writer.userId, complaint);
    const where = { complaint_id: complaint.id };
    expect(await db()('complaint_letters').where(where)).toEqual([]);
    for (const table of ['complaint_answers', 'complaint_received', 'complaint_replies']) {
      const rows = await db()(table).where(where).select('ciphertext');
      expect(rows.length, table).toBeGreaterThan(0);
      for (const { ciphertext } of rows) expect(ciphertext, table).toHaveLength(0);
    }
    expect(await openAnswerDesk(writer.userId, network, reference, new Date())).toBeNull();
    expect((await detail(reference)).replies[0]?.figures.stations[0]?.LAeq).toBe(57.4);
  });
});

describe('templates', () => {
  const who = () => ({ networkId: network.id, userId: writer.userId });

  test('have versions, refuse unknown fields, and are withdrawn and brought back', async () => {
    const entry = { template: null, version: 0, name: 'Short', body: 'Dear {{name}},\n\n{{measured}}' };
    const made = await keepTemplate(who(), entry);
    expect(made).toMatchObject({ kind: 'done' });
    const template = made.kind === 'done' ? made.value : 0;
    const refused = await keepTemplate(who(), { ...entry, body: '{{loudness}}' });
    expect(refused).toMatchObject({ kind: 'invalid', problems: [{ field: 'body' }] });
    const changed = { ...entry, template, version: 1, body: `${entry.body}\n\n{{limits}}` };
    expect(await keepTemplate(who(), changed)).toMatchObject({ kind: 'done' });
    expect(await keepTemplate(who(), changed)).toMatchObject({ kind: 'invalid' });
    expect((await offeredTemplates(network.id))[0]).toMatchObject({ name: 'Short', version: 2 });
    await withdrawTemplate(who(), template, true);
    expect((await offeredTemplates(network.id)).map(({ name }) => name)).toEqual(['Standard letter']);
    await withdrawTemplate(who(), template, false);
    expect((await offeredTemplates(network.id))[0]?.version).toBe(4);
  });

  test('a reply address that is none is refused', async () => {
    const outcome = await changeAnswering(who(), { needsApproval: false, replyAddress: 'desk {reference}' });
    expect(outcome).toMatchObject({ kind: 'invalid', problems: [{ field: 'replyAddress' }] });
  });
});
