import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { logAt, makeDesk, rowOf, type Desk } from './deskSupport';

useFreshSchema();

let desk: Desk;
let base: string;
let reference: string;

beforeAll(async () => {
  desk = await makeDesk();
  ({ reference } = await logAt(desk));
  base = `/api/v1/networks/merrow/complaints/${reference}`;
});

async function ask(method: string, path: string, body?: unknown, session = desk.liaison.session) {
  const answer = await callApi(method, path, { session, ...(body === undefined ? {} : { body }) });
  return { status: answer.status, value: (await answer.json()) as Record<string, unknown> };
}

const looksAtNotes = () =>
  db()('audit_log').where({ action: 'complaint.personal-data-read', subject: `complaint ${reference}` });

test.each([
  ['GET', 'assignment', undefined],
  ['PUT', 'assignment', { to: null }],
  ['GET', 'notes', undefined],
  ['POST', 'notes', { text: 'Left by somebody who may not.' }],
  ['POST', 'notes/1/withdrawal', { isWithdrawn: true }],
  ['PUT', 'merge', { into: null }],
])(
  '%s %s is not for operator or regulator, nor for people of another network',
  async (method, path, body) => {
    for (const session of [desk.operator, desk.regulator]) {
      expect((await ask(method, `${base}/${path}`, body, session)).status).toBe(403);
    }
    expect((await ask(method, `${base}/${path}`, body, desk.stranger)).status).toBe(404);
    const elsewhere = base.replace('merrow', 'farther');
    expect((await ask(method, `${elsewhere}/${path}`, body, desk.stranger)).status).not.toBe(200);
    expect(await db()('complaint_notes')).toEqual([]);
  },
);

describe('assignment', () => {
  test('tells who could answer, gives the complaint to one of them, and back to nobody', async () => {
    const { value } = await ask('GET', `${base}/assignment`);
    expect(value).toMatchObject({ assignedTo: null });
    const people = value['people'] as { id: string }[];
    expect(people.map(({ id }) => id).sort()).toEqual([desk.liaison.userId, desk.colleague.userId].sort());
    const given = await ask('PUT', `${base}/assignment`, { to: desk.colleague.userId });
    expect(given).toMatchObject({ status: 200, value: { assignedTo: { id: desk.colleague.userId } } });
    expect((await rowOf(desk.network, reference)).assignedTo).toBe(desk.colleague.userId);
    expect((await ask('PUT', `${base}/assignment`, { to: null })).value).toMatchObject({ assignedTo: null });
    const acts = await db()('audit_log').where({ action: 'complaint.assign' }).pluck('user_id');
    expect(acts).toEqual([desk.liaison.userId, desk.liaison.userId]);
  });

  test('of somebody who does not answer here changes nothing; of an unknown complaint is not found', async () => {
    const refused = await ask('PUT', `${base}/assignment`, { to: 'somebody' });
    expect(refused).toMatchObject({ status: 409, value: { code: 'refused' } });
    expect((await ask('PUT', `${base}/assignment`, {})).status).toBe(422);
    const unknown = base.replace(reference, 'MER-1999-0001');
    expect((await ask('GET', `${unknown}/assignment`)).status).toBe(404);
    expect((await ask('PUT', `${unknown}/assignment`, { to: null })).status).toBe(404);
    expect((await rowOf(desk.network, reference)).assignedTo).toBeNull();
  });
});

describe('notes', () => {
  test('are kept, read with an audit row, withdrawn and put back', async () => {
    const kept = await ask('POST', `${base}/notes`, { text: ' Calls after six. ' });
    expect(kept.status).toBe(201);
    const id = kept.value['id'] as number;
    const before = (await looksAtNotes()).length;
    const read = await ask('GET', `${base}/notes`, undefined, desk.administrator);
    expect(read.value).toMatchObject({ items: [{ id, text: 'Calls after six.' }], withdrawn: [] });
    expect(await looksAtNotes()).toHaveLength(before + 1);
    const withdrawal = `${base}/notes/${id}/withdrawal`;
    expect((await ask('POST', withdrawal, { isWithdrawn: true })).value).toEqual({ isWithdrawn: true });
    expect((await ask('GET', `${base}/notes`)).value).toEqual({ items: [], withdrawn: [id] });
    expect((await ask('POST', withdrawal, { isWithdrawn: true })).status).toBe(409);
    expect((await ask('POST', withdrawal, { isWithdrawn: false })).status).toBe(200);
    expect((await ask('GET', `${base}/notes`)).value['items']).toHaveLength(1);
  });

  test('need words, and a number of a note of this complaint', async () => {
    expect((await ask('POST', `${base}/notes`, { text: ' ' })).status).toBe(422);
    const other = await logAt(desk);
    const path = `/api/v1/networks/merrow/complaints/${other.reference}/notes`;
    const { id } = (await ask('POST', path, { text: 'Of the other one.' })).value;
    expect((await ask('POST', `${base}/notes/${String(id)}/withdrawal`, { isWithdrawn: true })).status).toBe(
      409,
    );
    expect((await ask('GET', path)).value['items']).toHaveLength(1);
  });
});

test('a repeat is merged and put back', async () => {
  const again = await logAt(desk);
  const path = `/api/v1/networks/merrow/complaints/${again.reference}/merge`;
  expect((await ask('PUT', path, { into: reference })).value).toEqual({ mergedInto: reference });
  expect(await rowOf(desk.network, again.reference)).toMatchObject({ closingReason: 'repeated' });
  expect((await ask('PUT', path, { into: reference })).status).toBe(409);
  expect((await ask('PUT', path, { into: null })).value).toEqual({ mergedInto: null });
  expect(await rowOf(desk.network, again.reference)).toMatchObject({ status: 'open', mergedInto: null });
});
