import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { findNetworkById } from '#db/queries/networks';
import type { TypedReport } from '#lib/contracts/reports';
import { answerCase } from '#lib/services/complaints/answerCase';
import { openCase } from '#lib/services/complaints/openCase';
import { addToReport, eraseReport } from '#lib/services/reports/actOnReport';
import { followReport } from '#lib/services/reports/followReport';
import { changeReportForm } from '#lib/services/reports/formSettings';
import { publicNetwork, type PublicNetwork } from '#lib/services/reports/openForm';
import { renewedStamp } from '#lib/services/reports/reportSecrets';
import { takeReport, type PostedReport } from '#lib/services/reports/takeReport';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';

useFreshSchema();

const NOW = new Date();
const NOW_SEC = Math.floor(NOW.getTime() / 1000);
const PNG = Buffer.concat([Buffer.from('\x89PNG\r\n\x1a\n', 'latin1'), Buffer.from('a kitchen at night')]);
const SECRETS = [
  'Ada Wren',
  'ada@wren.example',
  '3 Tern Row',
  'like a fridge',
  '54.10312',
  'kitchen',
  'woken',
];

const TYPED: TypedReport = {
  when: 'now',
  lasting: '30',
  day: '',
  clock: '',
  from: '',
  to: '',
  kind: 'hum',
  words: 'It sounds like a fridge.',
  area: 'Harbour quarter',
  place: '54.10312, 1.60277',
  name: 'Ada Wren',
  email: 'ada@wren.example',
  phone: '',
  address: '3 Tern Row',
  consent: 'yes',
  effects: ['woken', 'made up'],
};

let networkId: number;
let place: PublicNetwork;
let liaison: { userId: string; session: string };
const others: Record<string, string | undefined> = { nobody: undefined };
let addressCount = 0;

beforeAll(async () => {
  networkId = await makeNetwork('merrow');
  const elsewhere = await makeNetwork('farther');
  await makeStation(networkId, 'MER-04', { latitude: 54.105, longitude: 1.606 });
  await makeStation(networkId, 'MER-01', { latitude: 54.2, longitude: 1.6 });
  liaison = await makePerson(networkId, ['liaison']);
  others['operator'] = (await makePerson(networkId, ['operator'])).session;
  others['regulator'] = (await makePerson(networkId, ['regulator'])).session;
  others['a foreign liaison'] = (await makePerson(elsewhere, ['liaison'])).session;
  await setForm(true);
});

beforeEach(async () => {
  await db()('report_attempts').delete();
});

async function setForm(isOpen: boolean): Promise<void> {
  const network = await findNetworkById(networkId);
  if (!network) throw new Error('The network is not there.');
  const areas = [{ name: 'Harbour quarter', station: 'MER-01' }];
  await changeReportForm(liaison.userId, network, { isOpen, keeper: 'the liaison', areas });
  const found = await publicNetwork('merrow', NOW);
  if (!found) throw new Error('The form is not there.');
  place = found;
}

function posted(changes: Partial<PostedReport> = {}, typed: Partial<TypedReport> = {}): PostedReport {
  addressCount += 1;
  return {
    typed: { ...TYPED, ...typed },
    fileBytes: null,
    hidden: '',
    stamp: renewedStamp('', networkId, NOW_SEC - 60),
    language: 'en',
    address: `192.0.2.${addressCount}`,
    ...changes,
  };
}

async function take(changes: Partial<PostedReport> = {}, typed: Partial<TypedReport> = {}): Promise<string> {
  const outcome = await takeReport(place, posted(changes, typed), NOW);
  if (outcome.kind !== 'taken') throw new Error(JSON.stringify(outcome.faults));
  return outcome.key;
}

async function follow(key: string) {
  const followed = await followReport(place, key);
  if (!followed) throw new Error('The key opens nothing.');
  return followed;
}

const countComplaints = async () => Number((await db()('complaints').count({ n: '*' }).first())?.n);

/** Everything that the database holds, as one text. */
async function wholeDatabase(): Promise<string> {
  const [tables] = await db().raw('SHOW TABLES');
  const texts: string[] = [];
  for (const table of tables as Record<string, string>[]) {
    const rows = await db()(Object.values(table)[0] ?? '').select('*');
    const plain = (_: string, value: { type?: string; data?: number[] } | null) =>
      value?.type === 'Buffer' ? Buffer.from(value.data ?? []).toString('latin1') : value;
    texts.push(JSON.stringify(rows, plain));
  }
  return texts.join('\n');
}

describe('the whole way', () => {
  test('a report becomes a complaint at the desk, is answered, added to, and answered again', async () => {
    const key = await take({ fileBytes: PNG });
    const followed = await follow(key);
    expect(followed).toMatchObject({
      isErased: false,
      words: TYPED.words,
      canBeWrittenTo: true,
      file: { mediaType: 'image/png', byteCount: PNG.length },
      report: { area: 'Harbour quarter', language: 'en' },
      complaint: { status: 'open', source: 'resident', kind: 'hum', nearestStationCode: 'MER-04' },
    });
    const { complaint } = followed;
    expect(complaint.endsAtSec - complaint.startsAtSec).toBe(1800);

    const reader = { userId: liaison.userId, mayReadPersonalData: true, ...place };
    const opened = await openCase(reader, complaint.reference, NOW);
    expect(opened?.person).toMatchObject({
      contact: { name: 'Ada Wren', email: 'ada@wren.example', phone: null, address: '3 Tern Row' },
      effects: ['woken'],
      place: { latitude: 54.10312, longitude: 1.60277 },
    });
    const reply = { text: 'We heard it too.', items: null, figuresDigest: null, repliesSoFar: null };
    await answerCase(liaison.userId, place.network, complaint.reference, reply, NOW);
    expect((await follow(key)).letters.map(({ text }) => text)).toEqual(['We heard it too.']);
    expect((await follow(key)).complaint.status).toBe('answered');

    const addition = { text: 'It came back.', address: '192.0.2.200', now: NOW };
    expect(await addToReport(place, key, addition)).toEqual({ kind: 'done' });
    expect((await follow(key)).complaint.status).toBe('open');
    const again = await openCase(reader, complaint.reference, NOW);
    expect(again?.additions.map(({ text }) => text)).toEqual(['It came back.']);
    const blind = await openCase({ ...reader, mayReadPersonalData: false }, complaint.reference, NOW);
    expect(blind).toMatchObject({ person: undefined, additions: [] });
  });

  test('nothing personal, no address of a sender and no key stands readable in the database', async () => {
    const key = await take({ fileBytes: PNG, address: '198.51.100.77' });
    await addToReport(place, key, {
      text: 'The fridge is like a fridge',
      address: '198.51.100.77',
      now: NOW,
    });
    const everything = await wholeDatabase();
    expect(everything).toContain('complaint.report');
    for (const secret of [...SECRETS, key, '198.51.100.77']) {
      expect(everything.includes(secret), secret).toBe(false);
    }
    expect(await findAuditBreak()).toBeNull();
  });

  test('the very same form sent twice is one complaint; with other content it is another', async () => {
    const form = posted();
    const before = await countComplaints();
    const first = await takeReport(place, form, NOW);
    expect(await takeReport(place, form, NOW)).toEqual(first);
    expect(await countComplaints()).toBe(before + 1);
    const other = { ...form, typed: { ...form.typed, words: 'Something else.' } };
    expect(await takeReport(place, other, NOW)).not.toEqual(first);
    expect(await countComplaints()).toBe(before + 2);
  });
});

describe('what is not taken', () => {
  test.each<[string, Partial<PostedReport>, Partial<TypedReport>, object]>([
    ['a hidden field filled in', { hidden: 'https://spam.example' }, {}, { '': 'hidden-field' }],
    ['a form without its stamp', { stamp: '' }, {}, { '': 'form-expired' }],
    ['no consent', {}, { consent: '' }, { consent: 'consent' }],
    ['no kind, no area', {}, { kind: '', area: '', place: '' }, { kind: 'choose', area: 'choose' }],
    ['a place that is none', {}, { place: 'by the quay' }, { place: 'unreadable-place' }],
    ['elsewhere, and nowhere', {}, { area: 'elsewhere', place: '', address: '' }, { area: 'where-at-all' }],
    ['half an e-mail address', {}, { email: 'ada@' }, { email: 'unreadable-email' }],
    ['a file of another kind', { fileBytes: Buffer.from('<svg>') }, {}, { file: 'file-type' }],
    ['too large a file', { fileBytes: Buffer.alloc(6 * 1024 * 1024) }, {}, { file: 'file-size' }],
  ])('%s', async (_, changes, typed, faults) => {
    const before = await countComplaints();
    expect(await takeReport(place, posted(changes, typed), NOW)).toEqual({ kind: 'refused', faults });
    expect(await countComplaints()).toBe(before);
  });

  test('a form that came back at once, and one of another network', async () => {
    const fresh = posted({ stamp: renewedStamp('', networkId, NOW_SEC) });
    expect(await takeReport(place, fresh, NOW)).toEqual({ kind: 'refused', faults: { '': 'too-fast' } });
    const foreign = posted({ stamp: renewedStamp('', networkId + 1, NOW_SEC - 60) });
    expect(await takeReport(place, foreign, NOW)).toEqual({
      kind: 'refused',
      faults: { '': 'form-expired' },
    });
  });

  test('more than a few from one address; others go on', async () => {
    for (let count = 0; count < 6; count += 1) await take({ address: '203.0.113.5' });
    const outcome = await takeReport(place, posted({ address: '203.0.113.5' }), NOW);
    expect(outcome).toEqual({ kind: 'refused', faults: { '': 'too-many' } });
    await take({ address: '203.0.113.6' });
  });

  test('anything while the form is closed; private pages stay', async () => {
    const key = await take();
    await setForm(false);
    expect(await takeReport(place, posted(), NOW)).toEqual({ kind: 'refused', faults: { '': 'closed' } });
    expect(await followReport(place, key)).toBeDefined();
    await setForm(true);
  });
});

describe('who reaches what', () => {
  test('a network whose form was never set up is as absent as none', async () => {
    expect(await publicNetwork('farther', NOW)).toBeUndefined();
    expect(await publicNetwork('nowhere', NOW)).toBeUndefined();
  });

  test('a key opens its own report only, and not by way of another network', async () => {
    const key = await take();
    expect(await followReport(place, `${key.slice(0, -1)}${key.endsWith('A') ? 'B' : 'A'}`)).toBeUndefined();
    expect(await followReport(place, "' OR 1=1 --")).toBeUndefined();
    const foreign = { ...place, network: { ...place.network, id: networkId + 1 } };
    expect(await followReport(foreign, key)).toBeUndefined();
    expect(await eraseReport(foreign, key, true)).toEqual({ kind: 'unknown' });
  });

  test('the file is for the liaison, to be saved; each look is in the audit trail', async () => {
    const { complaint } = await follow(await take({ fileBytes: PNG }));
    const path = `/api/v1/networks/merrow/complaints/${complaint.reference}/attachment`;
    const answer = await callApi('GET', path, { session: liaison.session });
    expect(answer.status).toBe(200);
    expect(answer.headers.get('content-type')).toBe('application/octet-stream');
    expect(answer.headers.get('content-disposition')).toBe(
      `attachment; filename="${complaint.reference}.png"`,
    );
    expect(Buffer.from(await answer.arrayBuffer()).equals(PNG)).toBe(true);
    const looks = await db()('audit_log')
      .where({ action: 'complaint.personal-data-read' })
      .orderBy('id', 'desc');
    expect(looks[0]).toMatchObject({ user_id: liaison.userId, subject: `complaint ${complaint.reference}` });
    const statuses = Object.entries(others).map(
      async ([who, session]) => [who, (await callApi('GET', path, { session })).status] as const,
    );
    expect(Object.fromEntries(await Promise.all(statuses))).toEqual({
      nobody: 401,
      operator: 403,
      regulator: 403,
      'a foreign liaison': 404,
    });
  });

  test('readers without the role see where it came from and nothing about the person', async () => {
    const { complaint } = await follow(await take());
    const path = `/api/v1/networks/merrow/complaints/${complaint.reference}`;
    const body = await (await callApi('GET', path, { session: others['regulator'] })).text();
    expect(JSON.parse(body)).toMatchObject({
      source: 'resident',
      coarsePlace: { latitude: 54.1, longitude: 1.6 },
    });
    for (const secret of SECRETS) expect(body.includes(secret), secret).toBe(false);
  });
});

describe('erasing', () => {
  test('needs to be meant; then key, words, file and letters are gone, and the statistics stay', async () => {
    const key = await take({ fileBytes: PNG });
    const { complaint } = await follow(key);
    await addToReport(place, key, { text: 'More.', address: '192.0.2.201', now: NOW });
    expect(await eraseReport(place, key, false)).toEqual({
      kind: 'refused',
      faults: { erase: 'confirm-erase' },
    });
    expect(await eraseReport(place, key, true)).toEqual({ kind: 'done' });
    for (const table of ['keys', 'private', 'additions', 'attachments']) {
      const left = await db()(`complaint_${table}`).where({ complaint_id: complaint.id });
      expect(left, table).toEqual([]);
    }
    expect(await follow(key)).toMatchObject({
      isErased: true,
      words: '',
      file: null,
      additions: [],
      complaint: { status: 'closed', closingReason: 'erased', kind: 'hum' },
    });
    const more = await addToReport(place, key, { text: 'More.', address: '192.0.2.201', now: NOW });
    expect(more).toEqual({ kind: 'refused', faults: { addition: 'closed' } });
    const path = `/api/v1/networks/merrow/complaints/${complaint.reference}/attachment`;
    expect((await callApi('GET', path, { session: liaison.session })).status).toBe(404);
  });
});
