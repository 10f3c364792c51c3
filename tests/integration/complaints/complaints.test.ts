import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import type { Complaint } from '#lib/contracts/complaints';
import { resolveComplaintReply } from '#lib/services/complaints/replyMessage';
import { findComplaint, type ComplaintRow } from '#db/queries/complaints';
import { closeComplaint, erasePersonalData } from '#lib/services/complaints/closeComplaint';
import { correctContact } from '#lib/services/complaints/correctContact';
import { sendDueMail, type SenderSettings } from '#ingest/notify/sendOutbox';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { at, storeMinutes } from './support';

useFreshSchema();

const COMPLAINTS = '/api/v1/networks/merrow/complaints';
const SECRETS = ['Wren', 'ada@wren.example', '0555 0142', 'Tern Row', 'like a fridge', '54.10312', '1.60277'];
const WINDOW = { from: '2026-03-17T03:10:00Z', to: '2026-03-17T03:40:00Z' };
const report = {
  ...WINDOW,
  kind: 'hum',
  latitude: 54.10312,
  longitude: 1.60277,
  words: 'It sounds like a fridge in the wall.',
  contact: { name: 'Ada Wren', email: 'ada@wren.example', phone: '0555 0142', address: '3 Tern Row' },
};

let networkId: number;
let stationId: number;
const sessions: Record<'liaison' | 'operator' | 'regulator' | 'administrator' | 'stranger', string> = {
  liaison: '',
  operator: '',
  regulator: '',
  administrator: '',
  stranger: '',
};
let liaisonId: string;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  const elsewhere = await makeNetwork('farther');
  stationId = await makeStation(networkId, 'MER-04', { latitude: 54.105, longitude: 1.606 });
  await makeStation(networkId, 'MER-01', { latitude: 54.2, longitude: 1.6 });
  await makeStation(elsewhere, 'FAR-01', { latitude: 54.1031, longitude: 1.6027 });
  const liaison = await makePerson(networkId, ['liaison']);
  liaisonId = liaison.userId;
  sessions.liaison = liaison.session;
  sessions.operator = (await makePerson(networkId, ['operator'])).session;
  sessions.regulator = (await makePerson(networkId, ['regulator'])).session;
  sessions.administrator = (await makePerson(null, [], true)).session;
  sessions.stranger = (await makePerson(elsewhere, ['operator', 'liaison', 'regulator'])).session;
});

async function log(body: Record<string, unknown> = report): Promise<Complaint> {
  const answer = await callApi('POST', COMPLAINTS, { session: sessions.liaison, body });
  expect(answer.status).toBe(201);
  return ((await answer.json()) as { complaint: Complaint }).complaint;
}

async function rowOf(reference: string): Promise<ComplaintRow> {
  const row = await findComplaint(networkId, reference);
  if (!row) throw new Error(`${reference} is not there.`);
  return row;
}

const get = async (reference: string, session: string) =>
  (await callApi('GET', `${COMPLAINTS}/${reference}`, { session })).json();

/** Everything that the database holds, as one text: what a thief of a backup without keys would read. */
async function wholeDatabase(): Promise<string> {
  const [tables] = await db().raw('SHOW TABLES');
  const texts: string[] = [];
  for (const table of tables as Record<string, string>[]) {
    const rows = await db()(Object.values(table)[0] ?? '').select('*');
    texts.push(
      JSON.stringify(rows, (_, value) =>
        value?.type === 'Buffer' ? Buffer.from(value.data).toString('latin1') : value,
      ),
    );
  }
  return texts.join('\n');
}

describe('logging', () => {
  test('gives a reference, a due date ten working days on, the nearest station and a coarse place', async () => {
    const complaint = await log();
    expect(complaint).toMatchObject({
      ...WINDOW,
      kind: 'hum',
      status: 'open',
      isOverdue: false,
      coarsePlace: { latitude: 54.1, longitude: 1.6 },
      nearestStation: 'MER-04',
    });
    expect(complaint.reference).toMatch(new RegExp(`^MER-${new Date().getUTCFullYear()}-\\d{4}$`));
    expect(new Date(complaint.dueOn).getTime() - Date.now()).toBeGreaterThan(11 * 86_400_000);
  });

  test('numbers never repeat, however many are logged at once', async () => {
    const references = await Promise.all(Array.from({ length: 8 }, async () => (await log()).reference));
    expect(new Set(references).size).toBe(8);
  });

  test('nothing personal stands readable anywhere in the database, the audit trail included', async () => {
    await log();
    const everything = await wholeDatabase();
    expect(everything).toContain('complaint.log');
    for (const secret of SECRETS) expect(everything.includes(secret), secret).toBe(false);
  });

  test.each([
    ['a window that ends before it begins', { to: '2026-03-17T03:00:00Z' }, 'to'],
    ['a window in the future', { from: '2036-03-17T03:00:00Z', to: '2036-03-17T04:00:00Z' }, 'to'],
    ['a window of more than a week', { to: '2026-03-25T03:40:00Z' }, 'to'],
    ['a kind that is not on the list', { kind: 'purr' }, 'kind'],
    ['no place at all', { latitude: null, longitude: null }, 'station'],
    ['half a place', { longitude: null }, 'longitude'],
    ['a station of another network', { station: 'FAR-01' }, 'station'],
    ['an address that is none', { contact: { email: 'ada' } }, 'contact.email'],
  ])('refuses %s', async (_, change, field) => {
    const answer = await callApi('POST', COMPLAINTS, {
      session: sessions.liaison,
      body: { ...report, ...change },
    });
    expect(answer.status).toBe(422);
    const problem = (await answer.json()) as { fields: { field: string }[] };
    expect(problem.fields.map((found) => found.field)).toContain(field);
  });

  test('a station stands for a place that is not known', async () => {
    const complaint = await log({ ...report, latitude: null, longitude: null, station: 'MER-01' });
    expect(complaint).toMatchObject({ coarsePlace: null, nearestStation: 'MER-01' });
  });
});

describe('who may see what', () => {
  const routes = [
    ['GET', ''],
    ['POST', ''],
    ['GET', '/{reference}'],
    ['POST', '/{reference}/replies'],
  ] as const;
  const expected: Record<string, number[]> = {
    liaison: [200, 201, 200, 201],
    administrator: [200, 201, 200, 201],
    operator: [200, 403, 200, 403],
    regulator: [200, 403, 200, 403],
    stranger: [404, 404, 404, 404],
    nobody: [401, 401, 401, 401],
  };

  test.each(Object.keys(expected))('%s', async (who) => {
    const { reference } = await log();
    const session = sessions[who as keyof typeof sessions];
    for (const [at_, [method, path]] of routes.entries()) {
      const body = path === '' ? report : { text: 'Dear Ada Wren, …' };
      const answer = await callApi(method, COMPLAINTS + path.replace('{reference}', reference), {
        ...(session ? { session } : {}),
        ...(method === 'POST' ? { body } : {}),
      });
      expect(answer.status, `${method} ${path}`).toBe(expected[who]?.[at_]);
      const text = await answer.text();
      const maySee = (who === 'liaison' || who === 'administrator') && method === 'GET' && path !== '';
      for (const secret of SECRETS) {
        if (!maySee) expect(text, `${who}: ${secret}`).not.toContain(secret);
      }
      if (maySee) expect(text).toContain('ada@wren.example');
    }
  });

  test('another network does not reach it by its own path either', async () => {
    const { reference } = await log();
    const answer = await callApi('GET', `/api/v1/networks/farther/complaints/${reference}`, {
      session: sessions.stranger,
    });
    expect(answer.status).toBe(404);
  });

  test('a reader without personal data gets the nearest station alone, so that distances tell no place', async () => {
    const { reference } = await log();
    const seen = (session: string) =>
      get(reference, session).then((body) =>
        (body as { evidence: { stations: { station: string }[] } }).evidence.stations.map((s) => s.station),
      );
    expect(await seen(sessions.regulator)).toEqual(['MER-04']);
    expect(await seen(sessions.liaison)).toEqual(['MER-04', 'MER-01']);
  });

  test('each look at personal data is audited by field names, and the chain holds', async () => {
    const { reference } = await log();
    const looks = () =>
      db()('audit_log')
        .where({ action: 'complaint.personal-data-read', subject: `complaint ${reference}` })
        .select('user_id', 'detail');
    await get(reference, sessions.regulator);
    expect(await looks()).toEqual([]);
    await get(reference, sessions.liaison);
    const [look] = await looks();
    expect(look.user_id).toBe(liaisonId);
    expect(look.detail).toEqual({
      fields: ['name', 'email', 'phone', 'address', 'words', 'place'],
    });
    expect(await findAuditBreak()).toBeNull();
  });
});

describe('the list', () => {
  test('goes by due date, tells what is overdue, filters and pages', async () => {
    const [first, second] = [await log(), await log()];
    await db()('complaints').where({ reference: second.reference }).update({ due_on: '2026-01-05' });
    const page = async (query: string) =>
      (await (await callApi('GET', `${COMPLAINTS}${query}`, { session: sessions.regulator })).json()) as {
        items: Complaint[];
        next: string | null;
      };
    const { items, next } = await page('?limit=1');
    expect(items).toHaveLength(1);
    expect(items[0]).toMatchObject({ reference: second.reference, dueOn: '2026-01-05', isOverdue: true });
    const seen = new Set([second.reference]);
    for (let cursor = next; cursor;) {
      const more = await page(`?limit=2&cursor=${cursor}`);
      for (const { reference } of more.items) {
        expect(seen.has(reference)).toBe(false);
        seen.add(reference);
      }
      cursor = more.next;
    }
    const total = await db()('complaints').where({ network_id: networkId }).count({ count: '*' }).first();
    expect(seen.size).toBe(Number(total?.count));
    expect(seen.has(first.reference)).toBe(true);
    expect((await page('?status=closed')).items).toEqual([]);
    expect((await page('?from=2026-03-18T00:00:00Z&to=2026-03-19T00:00:00Z')).items).toEqual([]);
    const wrong = await callApi('GET', `${COMPLAINTS}?status=lost`, { session: sessions.liaison });
    expect(wrong.status).toBe(400);
  });
});

describe('evidence and reply', () => {
  const DAY_SEC = 86_400;
  const from = at(WINDOW.from);

  beforeAll(async () => {
    // Half an hour of 50 dB and 60 dB in turn, with a band at 100 Hz far above its neighbours.
    await storeMinutes(stationId, at('2026-03-17T03:00:00Z'), at('2026-03-17T04:00:00Z'), (startSec) => ({
      laeqCentiDb: (startSec / 60) % 2 === 0 ? 5000 : 6000,
      bandCentiDb: (index) => (index === -10 ? 6200 : 4000),
    }));
    // Three of the eight Tuesdays before, one of them with too little data: 40, 42 dB count, 70 dB does not.
    const weeks: [number, number, number][] = [
      [1, 4000, 30],
      [2, 4200, 30],
      [3, 7000, 5],
    ];
    for (const [week, laeqCentiDb, minutes] of weeks) {
      const start = from - week * 7 * DAY_SEC;
      await storeMinutes(stationId, start, start + minutes * 60, () => ({ laeqCentiDb }));
    }
    await db()('limits').insert({ id: 1, network_id: networkId, created_at: new Date() });
    await db()('limit_versions').insert({
      id: 1,
      limit_id: 1,
      version: 1,
      effective_from: at('2026-01-01T00:00:00Z'),
      name: 'Night hours',
      metric: 'LAeq',
      averaging: '1h',
      threshold_tenths: 500,
      recipients: '[]',
      created_at: new Date(),
    });
    const row = {
      network_id: networkId,
      station_id: stationId,
      limit_id: 1,
      limit_version_id: 1,
      level_db: 57.404,
      threshold_tenths: 500,
      coverage: 1,
      detected_at: new Date(),
    };
    await db()('exceedances').insert([
      { ...row, starts_at: at('2026-03-17T03:00:00Z'), ends_at: at('2026-03-17T04:00:00Z') },
      { ...row, starts_at: at('2026-03-17T04:00:00Z'), ends_at: at('2026-03-17T05:00:00Z') },
    ]);
  });

  test('the figures are those of the very window, with usual, limits and tones', async () => {
    const { reference } = await log();
    const { evidence } = (await get(reference, sessions.liaison)) as { evidence: { stations: unknown[] } };
    expect(evidence.stations[0]).toMatchObject({
      station: 'MER-04',
      LAeq: 57.4,
      LAFmax: 69,
      LA10: 60,
      LA90: 50,
      coverage: 1,
      meetsMinimum: true,
      usual: { weeks: 8, validWeeks: 2, median: 41, low: 40.2, high: 41.8 },
      limits: { set: 1, applying: 1, unjudged: 0 },
      exceedances: [
        { limit: 'Night hours', metric: 'LAeq,1 h', level: 57.4, threshold: 50, state: 'standing' },
      ],
      tonality: 'assessed',
      tones: [{ method: 'survey', excess: 22 }],
      context: {
        rank: 100,
        uncertainty: 1,
        limits: [
          {
            limit: 'Night hours',
            metric: 'LAeq,1 h',
            threshold: 50,
            windows: [{ from: '2026-03-17T03:00:00Z', to: '2026-03-17T04:00:00Z' }],
            isExceeded: true,
          },
        ],
        lowFrequency: null,
        standingOut: [{ isTone: true, words: expect.stringContaining('100 Hz') }],
        exclusions: [],
      },
    });
  });

  const answer = (reference: string, body: Record<string, unknown>) =>
    callApi('POST', `${COMPLAINTS}/${reference}/replies`, { session: sessions.liaison, body });

  test('a reply is kept with its figures, its e-mail waits without a name, and the complaint is answered', async () => {
    const { reference } = await log();
    const { evidence } = (await get(reference, sessions.liaison)) as { evidence: { digest: string } };
    const text = 'Dear {{name}},\n\nIt was {{laeq}} <there>.\n\n{{measured}} {{limits}} {{second-station}}';
    const sent = await answer(reference, { text, figuresDigest: evidence.digest, repliesSoFar: 0 });
    expect(sent.status).toBe(201);
    expect(await sent.json()).toMatchObject({ reply: { delivery: 'waiting', figures: evidence } });

    const row = await rowOf(reference);
    expect(row).toMatchObject({ status: 'answered' });
    const reply = await db()('complaint_replies').where({ complaint_id: row.id }).first();
    const mail = await db()('outbox').where({ complaint_reply_id: reply.id }).first();
    expect(mail).toMatchObject({
      kind: 'complaint-reply',
      recipient: null,
      subject: `Your noise report ${reference}`,
      text_body: null,
      html_body: null,
      state: 'waiting',
    });
    expect(mail.message_id).toMatch(new RegExp(`^<${reference}\\.${reply.id}\\.[\\w-]+@[\\w.-]+>$`));
    expect(await resolveComplaintReply(reply.id)).toMatchObject({
      to: 'ada@wren.example',
      subject: `Your noise report ${reference}`,
      text: expect.stringMatching(
        /^Dear Ada Wren,\n\nIt was 57\.4 dB\(A\) <there>\.\n\nOur nearest station, Station MER-04/,
      ),
      html: expect.stringContaining('It was 57.4 dB(A) &lt;there&gt;.'),
      attachments: [{ filename: `${reference}.pdf`, contentType: 'application/pdf' }],
    });
    const everything = await wholeDatabase();
    for (const secret of SECRETS) expect(everything.includes(secret), secret).toBe(false);
  });

  test('an e-mail that a mail server refuses leaves no address in the outbox either', async () => {
    const { reference } = await log();
    await answer(reference, { text: 'Dear Ada Wren, …' });
    const sent: unknown[] = [];
    const refusing: SenderSettings = {
      from: 'desk@merrow.example',
      holder: 'test',
      resolvers: {
        'complaint-reply': (mail) => resolveComplaintReply(mail.complaintReplyId ?? 0),
      },
      transport: {
        sendMail: (message: unknown) => {
          sent.push(message);
          const refusal = new Error('550 <ada@wren.example> unknown');
          return Promise.reject(Object.assign(refusal, { code: 'EENVELOPE', responseCode: 550 }));
        },
      },
    };
    while ((await sendDueMail(refusing, new Date())) > 0);
    expect(sent).toContainEqual(
      expect.objectContaining({
        to: { name: '', address: 'ada@wren.example' },
        subject: `Your noise report ${reference}`,
      }),
    );
    const errors: string[] = await db()('outbox').whereNotNull('last_error').pluck('last_error');
    expect(errors.length).toBeGreaterThan(0);
    for (const error of errors) expect(error).toBe('Not delivered, EENVELOPE, 550');
  });

  test('the regulator reads the same figures, and not the text', async () => {
    const { reference } = await log();
    await answer(reference, { text: 'Dear Ada Wren, secret text' });
    const seen = JSON.stringify(await get(reference, sessions.regulator));
    expect(seen).toContain('"LAeq":57.4');
    expect(seen).not.toContain('secret text');
    expect(await get(reference, sessions.liaison)).toMatchObject({
      replies: [{ text: 'Dear Ada Wren, secret text' }],
    });
  });

  test('figures that changed since the draft stop the reply', async () => {
    const { reference } = await log({ ...report, from: '2026-03-17T02:40:00Z' });
    const { evidence } = (await get(reference, sessions.liaison)) as { evidence: { digest: string } };
    await storeMinutes(stationId, at('2026-03-17T02:40:00Z'), at('2026-03-17T03:00:00Z'), () => ({
      laeqCentiDb: 5500,
    }));
    const refused = await answer(reference, { text: 'Dear …', figuresDigest: evidence.digest });
    expect(refused.status).toBe(409);
    expect(await refused.json()).toMatchObject({ code: 'figures-changed' });
    expect(await rowOf(reference)).toMatchObject({ status: 'open' });
  });

  test('of two people who answer at once one is told that the other did', async () => {
    const { reference } = await log();
    const both = await Promise.all(
      [1, 2].map((n) => answer(reference, { text: `Reply ${n}`, repliesSoFar: 0 })),
    );
    expect(both.map(({ status }) => status).sort()).toEqual([201, 409]);
    const { id } = await rowOf(reference);
    const mails = await db()('outbox').whereIn(
      'complaint_reply_id',
      db()('complaint_replies').where({ complaint_id: id }).select('id'),
    );
    expect(mails).toHaveLength(1);
  });

  test('without an e-mail address the reply is a letter, and nothing waits to be sent', async () => {
    const { reference } = await log({ ...report, contact: { name: 'Ada Wren' } });
    const sent = await answer(reference, { text: 'Dear Ada Wren, …' });
    expect(await sent.json()).toMatchObject({ reply: { delivery: 'letter' } });
    const { id } = await rowOf(reference);
    const reply = await db()('complaint_replies').where({ complaint_id: id }).first();
    expect(await resolveComplaintReply(reply.id)).toBeNull();
  });

  test('an unknown complaint is not answered', async () => {
    expect((await answer('MER-1999-0001', { text: 'Dear …' })).status).toBe(404);
  });

  describe('erasure', () => {
    test('destroys key and ciphertexts, gives up the waiting e-mail, keeps the coarse record and the figures', async () => {
      const { reference } = await log();
      await answer(reference, { text: 'Dear Ada Wren, …' });
      const row = await rowOf(reference);
      const reply = await db()('complaint_replies').where({ complaint_id: row.id }).first();
      await erasePersonalData(liaisonId, row);

      expect(await db()('complaint_keys').where({ complaint_id: row.id })).toEqual([]);
      expect(await db()('complaint_private').where({ complaint_id: row.id })).toEqual([]);
      expect(await resolveComplaintReply(reply.id)).toBeNull();
      expect(await db()('outbox').where({ complaint_reply_id: reply.id }).first()).toMatchObject({
        state: 'dead',
      });
      const seen = (await get(reference, sessions.liaison)) as Record<string, unknown>;
      expect(seen).toMatchObject({ private: null, status: 'answered', kind: 'hum' });
      expect(seen['replies']).toMatchObject([{ text: null, figures: { stations: [{ LAeq: 57.4 }, {}] } }]);
      expect((await answer(reference, { text: 'again' })).status).toBe(409);
    });

    test('of an open complaint closes it, and so does a reason from the list, once', async () => {
      const [erased, withdrawn] = [await log(), await log()];
      await erasePersonalData(liaisonId, await rowOf(erased.reference));
      expect(await rowOf(erased.reference)).toMatchObject({ status: 'closed', closingReason: 'erased' });
      expect(await closeComplaint(liaisonId, await rowOf(withdrawn.reference), 'withdrawn')).toBe(true);
      expect(await closeComplaint(liaisonId, await rowOf(withdrawn.reference), 'repeated')).toBe(false);
      expect(await rowOf(withdrawn.reference)).toMatchObject({ closingReason: 'withdrawn' });
      const refused = await answer(withdrawn.reference, { text: 'Dear …' });
      expect(await refused.json()).toMatchObject({ code: 'closed' });
    });
  });

  test('a corrected contact is used, and audited by field name', async () => {
    const { reference } = await log();
    const contact = { ...report.contact, email: 'ada.wren@tern.example' };
    expect(await correctContact(liaisonId, await rowOf(reference), contact)).toBe(true);
    const seen = (await get(reference, sessions.liaison)) as { private: { contact: unknown; words: string } };
    expect(seen.private).toMatchObject({ contact, words: report.words });
    const entry = await db()('audit_log')
      .where({ action: 'complaint.contact-correct', subject: `complaint ${reference}` })
      .first('detail');
    expect(entry.detail).toEqual({ fields: ['email'] });
  });
});
