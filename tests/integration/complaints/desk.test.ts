import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { findAuditBreak } from '#db/queries/audit';
import { replaceHolidays } from '#db/queries/holidays';
import { inTransaction } from '#db/queries/connection';
import { remindComplaints } from '#ingest/notify/remindComplaints';
import { DEFAULT_DESK_SETTINGS } from '#lib/contracts/complaintDesk';
import { personalExportSchema } from '#lib/contracts/personalExport';
import { erasePersonalData } from '#lib/services/complaints/closeComplaint';
import { correctContact } from '#lib/services/complaints/correctContact';
import { assignCase } from '#lib/services/complaints/desk/assign';
import { caseDesk } from '#lib/services/complaints/desk/caseDesk';
import { contactDigests, digestOlderContacts } from '#lib/services/complaints/desk/contactDigests';
import { keepComplaints } from '#ingest/jobs/keepComplaints';
import { mergeCase, unmergeCase } from '#lib/services/complaints/desk/merge';
import { addNote, withdrawNote } from '#lib/services/complaints/desk/notes';
import { personHistory } from '#lib/services/complaints/desk/personHistory';
import { changeDeskSettings } from '#lib/services/complaints/desk/settings';
import { openPersonalData } from '#lib/services/complaints/readPersonalData';
import { addDays } from '#lib/time/zone';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { logAt, makeDesk, rowOf, type Desk } from './deskSupport';

useFreshSchema();

let desk: Desk;
const act = (reference: string) => ({ userId: desk.liaison.userId, network: desk.network, reference });
const settle = (change: Partial<typeof DEFAULT_DESK_SETTINGS>) =>
  changeDeskSettings(desk.liaison.userId, desk.network, { ...DEFAULT_DESK_SETTINGS, ...change });
const listed = async (query: string, session = desk.liaison.session) => {
  const answer = await callApi('GET', `/api/v1/networks/merrow/complaints.csv?${query}`, { session });
  expect(answer.status).toBe(200);
  return (await answer.text())
    .trim()
    .split('\r\n')
    .slice(1)
    .map((line) => line.split(',')[0]);
};

beforeAll(async () => {
  desk = await makeDesk();
});

describe('due dates and reminders', () => {
  test('follow the settings, the working days and the named dates of the network', async () => {
    await settle({ answerDays: 1, workingWeekdays: [0, 1, 2, 3, 4, 5, 6] });
    const plain = await logAt(desk);
    const tomorrow = plain.dueOn;
    await inTransaction((transaction) =>
      replaceHolidays(
        desk.network.id,
        [{ date: tomorrow, name: 'Fair day' }],
        desk.liaison.userId,
        transaction,
      ),
    );
    expect((await logAt(desk)).dueOn).toBe(addDays(tomorrow, 1));
    await inTransaction((transaction) =>
      replaceHolidays(desk.network.id, [], desk.liaison.userId, transaction),
    );
    await settle({});
  });

  test('the person who answers is told once before and once after, everybody where it is nobody; nothing personal', async () => {
    await db()('complaints').update({ status: 'closed', closed_at: new Date() });
    await db()('outbox').delete();
    const mine = await logAt(desk);
    await assignCase(act(mine.reference), desk.colleague.userId);
    const told = async () =>
      (await db()('outbox').orderBy('id').select('kind', 'recipient', 'subject', 'text_body')) as {
        kind: string;
        recipient: string;
        subject: string;
        text_body: string;
      }[];
    await remindComplaints(new Date());
    expect(await told()).toEqual([]);
    const dayBefore = new Date(`${addDays(mine.dueOn, -1)}T12:00:00Z`);
    await remindComplaints(dayBefore);
    await remindComplaints(dayBefore);
    expect((await told()).map(({ kind }) => kind)).toEqual(['complaint-due']);
    const dayAfter = new Date(`${addDays(mine.dueOn, 1)}T12:00:00Z`);
    await remindComplaints(dayAfter);
    await remindComplaints(dayAfter);
    expect((await told()).map(({ kind }) => kind)).toEqual(['complaint-due', 'complaint-overdue']);
    await assignCase(act(mine.reference), null);
    await remindComplaints(dayAfter);
    const recipients = (await told()).filter(({ kind }) => kind === 'complaint-overdue');
    expect(new Set(recipients.map(({ recipient }) => recipient)).size).toBe(2);
    for (const { subject, text_body } of await told()) {
      expect(subject + text_body).toContain(mine.reference);
      expect(subject + text_body).not.toMatch(/Wren/);
    }
  });
});

describe('assignment, filters, CSV', () => {
  test('the list is narrowed by person, sound, area, date, reference and overdue, and says so in the file', async () => {
    await db()('complaints').update({ status: 'closed', closed_at: new Date() });
    const [hum, bang] = [
      await logAt(desk),
      await logAt(desk, { kind: 'bang', station: null, area: 'Station MER-04' }),
    ];
    expect(await assignCase(act(hum.reference), desk.colleague.userId)).toEqual({ kind: 'done' });
    expect(await listed('status=open')).toEqual([hum.reference, bang.reference]);
    expect(await listed(`assignee=${desk.colleague.userId}`)).toEqual([hum.reference]);
    expect(await listed('assignee=me', desk.colleague.session)).toEqual([hum.reference]);
    expect(await listed('assignee=nobody')).toEqual([bang.reference]);
    expect(await listed('kind=bang')).toEqual([bang.reference]);
    expect(await listed(`area=${encodeURIComponent('Station MER-04')}`)).toEqual([bang.reference]);
    expect(await listed('from=2026-03-18')).toEqual([]);
    expect(await listed('from=2026-03-17&to=2026-03-17')).toHaveLength(2);
    expect(await listed(`reference=${hum.reference.slice(-4)}`)).toContain(hum.reference);
    expect(await listed('status=overdue')).toEqual([]);
    await db()('complaints').where({ id: bang.id }).update({ due_on: '2026-01-01' });
    expect(await listed('status=overdue')).toEqual([bang.reference]);
  });

  test('nobody is given a complaint who does not answer here', async () => {
    const { reference } = await logAt(desk);
    const outcome = await assignCase(act(reference), 'somebody else');
    expect(outcome).toMatchObject({ kind: 'refused' });
    expect((await rowOf(desk.network, reference)).assignedTo).toBeNull();
  });

  test('an area that the network has not is refused', async () => {
    await expect(logAt(desk, { station: null, area: 'The moon' })).rejects.toThrow(/must be an area/);
  });
});

describe('merging', () => {
  test('closes the repeat, keeps its data, is told in the history, and is undone to what it was', async () => {
    const [first, again] = [await logAt(desk), await logAt(desk)];
    expect(await mergeCase(act(again.reference), first.reference.toLowerCase())).toEqual({ kind: 'done' });
    expect(await rowOf(desk.network, again.reference)).toMatchObject({
      status: 'closed',
      closingReason: 'repeated',
      mergedInto: first.reference,
    });
    expect(await openPersonalData(again.id, db())).not.toBeNull();
    const person = await openPersonalData(first.id, db());
    const opened = await caseDesk(desk.liaison.userId, desk.network, first, person);
    expect(opened.repeats.map(({ reference }) => reference)).toEqual([again.reference]);
    expect(opened.mergeChoices.map(({ reference }) => reference)).not.toContain(again.reference);
    expect(await mergeCase(act(first.reference), again.reference)).toMatchObject({ kind: 'refused' });
    expect(await unmergeCase(act(again.reference))).toEqual({ kind: 'done' });
    expect(await rowOf(desk.network, again.reference)).toMatchObject({
      status: 'open',
      closingReason: null,
      closedAt: null,
      mergedInto: null,
    });
    const { history } = await caseDesk(desk.liaison.userId, desk.network, again, null);
    expect(history.map(({ what }) => what)).toEqual([
      'Logged at the desk',
      `Merged into another one (into ${first.reference})`,
      expect.stringContaining('Merge undone'),
    ]);
    expect(history.every(({ by }) => by !== null)).toBe(true);
  });

  test.each([
    ['itself', (reference: string) => reference],
    ['one that is not there', () => 'MER-1999-0001'],
  ])('is refused into %s', async (_, into) => {
    const { reference } = await logAt(desk);
    expect(await mergeCase(act(reference), into(reference))).toMatchObject({ kind: 'refused' });
    expect(await rowOf(desk.network, reference)).toMatchObject({ status: 'open' });
  });
});

describe('notes', () => {
  test('are sealed, withdrawn and put back; each look is audited', async () => {
    const row = await logAt(desk);
    await addNote(act(row.reference), 'Her brother Crispin called as well.');
    const looks = async () =>
      Number(
        (
          await db()('audit_log')
            .where({ action: 'complaint.personal-data-read', subject: `complaint ${row.reference}` })
            .count({ n: '*' })
            .first()
        )?.n,
      );
    const before = await looks();
    const opened = await caseDesk(desk.colleague.userId, desk.network, row, null);
    expect(opened.notes).toMatchObject([{ text: 'Her brother Crispin called as well.' }]);
    expect(await looks()).toBe(before + 1);
    const stored = await db()('complaint_notes').where({ complaint_id: row.id }).first();
    expect(stored.ciphertext.toString('latin1')).not.toContain('Crispin');
    const noteId = opened.notes[0]?.id ?? 0;
    await withdrawNote(act(row.reference), noteId, false);
    expect(await caseDesk(desk.liaison.userId, desk.network, row, null)).toMatchObject({
      notes: [],
      withdrawn: [noteId],
    });
    expect(await withdrawNote(act(row.reference), noteId, false)).toMatchObject({ kind: 'refused' });
    await withdrawNote(act(row.reference), noteId, true);
    expect((await caseDesk(desk.liaison.userId, desk.network, row, null)).notes).toHaveLength(1);
  });
});

describe('a person with a history', () => {
  const ofPerson = async (reference: string) => {
    const history = await personHistory(
      desk.liaison.userId,
      desk.network,
      desk.settings,
      reference,
      new Date(),
    );
    if (typeof history === 'string') return history;
    return history.complaints.map((complaint) => complaint.reference).sort();
  };

  test('is known by address or number however written, not by name, and follows a corrected contact', async () => {
    const first = await logAt(desk, {
      contact: { name: 'Bo Lark', email: 'bo@lark.example', phone: '+44 1555 014 277' },
    });
    const byPhone = await logAt(desk, { contact: { name: 'B. Lark', phone: '01555 014277' } });
    const byMail = await logAt(desk, { contact: { email: 'Bo@Lark.example' } });
    const namesake = await logAt(desk, { contact: { name: 'Bo Lark', email: 'other@lark.example' } });
    expect(await ofPerson(first.reference)).toEqual(
      [first, byPhone, byMail].map((row) => row.reference).sort(),
    );
    expect(await ofPerson(namesake.reference)).toEqual([namesake.reference]);
    const contact = { name: null, email: 'bo@lark.example', phone: null, address: null };
    await correctContact(desk.liaison.userId, namesake, contact);
    expect(await ofPerson(namesake.reference)).toContain(first.reference);
  });

  test('in another network the same address and number have other digests', () => {
    const contact = { name: null, email: 'bo@lark.example', phone: '01555 014277', address: null };
    const [here, there] = [1, 2].map((networkId) =>
      contactDigests(networkId, contact).map(({ digest }) => digest.toString('hex')),
    );
    expect(here).toHaveLength(2);
    expect(here).toEqual(contactDigests(1, contact).map(({ digest }) => digest.toString('hex')));
    expect(here?.some((digest) => there?.includes(digest))).toBe(false);
  });

  test('complaints from before there were digests get theirs', async () => {
    const row = await logAt(desk, { contact: { email: 'early@lark.example' } });
    await db()('complaint_contacts').where({ complaint_id: row.id }).delete();
    expect(await digestOlderContacts(10)).toBe(1);
    expect(await digestOlderContacts(10)).toBe(0);
    expect(await db()('complaint_contacts').where({ complaint_id: row.id })).toMatchObject([
      { kind: 'email' },
    ]);
  });

  test('all that is held goes out as JSON and as text, is audited, and is nobody else’s', async () => {
    const email = 'cleo@reed.example';
    const row = await logAt(desk, { contact: { name: 'Cleo Reed', email }, words: 'It drones.' });
    const other = await logAt(desk, { contact: { email } });
    await addNote(act(row.reference), 'Prefers the evening.');
    const path = `/api/v1/networks/merrow/complaints/${row.reference}/person`;
    for (const session of [desk.operator, desk.regulator, desk.stranger]) {
      expect([403, 404]).toContain((await callApi('GET', path, { session })).status);
    }
    const answer = await callApi('GET', path, { session: desk.liaison.session });
    const held = personalExportSchema.parse(await answer.json());
    expect(held.complaints.map(({ reference }) => reference).sort()).toEqual([
      row.reference,
      other.reference,
    ]);
    expect(held.complaints.find(({ reference }) => reference === row.reference)).toMatchObject({
      person: { words: 'It drones.', contact: { name: 'Cleo Reed' } },
      notes: [{ text: 'Prefers the evening.' }],
    });
    const readable = await callApi('GET', `${path}?format=text`, { session: desk.administrator });
    const text = await readable.text();
    for (const part of ['Cleo Reed', 'It drones.', 'Prefers the evening.', other.reference]) {
      expect(text).toContain(part);
    }
    expect(readable.headers.get('content-disposition')).not.toMatch(/cleo|reed/i);
    const noted = await db()('audit_log').where({
      action: 'complaint.personal-data-export',
      subject: `complaint ${other.reference}`,
    });
    expect(noted).toHaveLength(2);
  });
});

describe('erasure', () => {
  test('takes notes and digests along; the audit chain holds, and the complaint still counts', async () => {
    const row = await logAt(desk, { contact: { email: 'erased@wren.example' } });
    await addNote(act(row.reference), 'A note about somebody.');
    await erasePersonalData(desk.liaison.userId, row);
    expect(await db()('complaint_contacts').where({ complaint_id: row.id })).toEqual([]);
    const note = await db()('complaint_notes').where({ complaint_id: row.id }).first();
    expect(note.ciphertext).toHaveLength(0);
    expect((await caseDesk(desk.liaison.userId, desk.network, row, null)).notes).toEqual([]);
    expect(await addNote(act(row.reference), 'Too late.')).toMatchObject({ kind: 'refused' });
    expect(await findAuditBreak()).toBeNull();
    expect(await listed(`status=all&reference=${row.reference}`)).toEqual([row.reference]);
  });

  test('happens by itself when the time of the settings is over, never to what is open or still moves', async () => {
    await settle({ retentionMonths: 6 });
    const [over, recent, open, moving] = await Promise.all([0, 1, 2, 3].map(() => logAt(desk)));
    const closeAt = (row: { id: number } | undefined, instant: string) =>
      db()('complaints')
        .where({ id: row?.id })
        .update({ status: 'closed', closed_at: new Date(instant), closing_reason: 'withdrawn' });
    const now = new Date('2026-12-01T12:00:00Z');
    await db()('complaints').update({ status: 'open' });
    await closeAt(over, '2026-05-31T12:00:00Z');
    await closeAt(recent, '2026-06-02T12:00:00Z');
    await closeAt(moving, '2026-05-01T12:00:00Z');
    await db()('complaint_additions').insert({
      complaint_id: moving?.id,
      ciphertext: Buffer.alloc(1),
      created_at: new Date('2026-07-01T12:00:00Z'),
    });
    expect(await keepComplaints(now)).toMatch(/^1 erased/);
    expect(await keepComplaints(now)).toMatch(/^0 erased/);
    const kept = async (row: { id: number } | undefined) =>
      (await db()('complaint_keys').where({ complaint_id: row?.id })).length;
    expect(await Promise.all([over, recent, open, moving].map(kept))).toEqual([0, 1, 1, 1]);
    expect(
      await db()('audit_log')
        .where({ action: 'complaint.personal-data-erase', subject: `complaint ${over?.reference}` })
        .first('detail', 'user_id'),
    ).toMatchObject({ user_id: null });
    await settle({});
  });
});

test('a place is told by the step of the settings: rounder, or not at all', async () => {
  const row = await logAt(desk, { latitude: 54.1282, longitude: 1.6399, station: null });
  const told = async () => {
    const path = `/api/v1/networks/merrow/complaints/${row.reference}`;
    const answer = await callApi('GET', path, { session: desk.regulator });
    return ((await answer.json()) as { coarsePlace: unknown }).coarsePlace;
  };
  expect(await told()).toEqual({ latitude: 54.13, longitude: 1.64 });
  await settle({ placeStepHundredths: 5 });
  expect(await told()).toEqual({ latitude: 54.15, longitude: 1.65 });
  await settle({ placeStepHundredths: 0 });
  expect(await told()).toBeNull();
  await settle({});
});
