import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { holidaysOfLines, linesOfHolidays } from '../../../src/pages/n/[network]/limits/_holidayLines';

useFreshSchema();

const PATH = '/api/v1/networks/dates/holidays';
let networkId: number;
let operator: string;
let regulator: string;

beforeAll(async () => {
  networkId = await makeNetwork('dates');
  await makeStation(networkId, 'DA-1');
  ({ session: operator } = await makePerson(networkId, ['operator']));
  ({ session: regulator } = await makePerson(networkId, ['regulator']));
});

const put = (items: object[], session = operator) => callApi('PUT', PATH, { session, body: { items } });

test('an operator puts a list, everybody reads it, the audit trail has what changed', async () => {
  const items = [
    { date: '2026-12-25', name: 'Christmas Day' },
    { date: '2026-12-26', name: 'Boxing Day' },
  ];
  expect((await put(items)).status).toBe(200);
  expect((await put(items.slice(0, 1))).status).toBe(200);
  const read = await callApi('GET', PATH, { session: regulator });
  expect(await read.json()).toEqual({ items: items.slice(0, 1) });
  expect((await put(items, regulator)).status).toBe(403);
  const acts = await db()('audit_log').where({ network_id: networkId, action: 'holidays.change' });
  expect(acts).toHaveLength(2);
  expect(JSON.stringify(acts[1].detail)).toContain('Boxing Day');
});

test('a limit that heeds them is set with them; what does not fit is refused by its field', async () => {
  const limit = {
    name: 'Sundays',
    metric: 'LAeq',
    window: 'hours',
    from: '22:00',
    to: '06:00',
    threshold: 45,
  };
  const path = '/api/v1/networks/dates/limits';
  const set = await callApi('POST', path, { session: operator, body: { ...limit, holidays: 'as-sunday' } });
  expect(set.status).toBe(201);
  expect(await set.json()).toMatchObject({
    limit: { holidays: 'as-sunday', window: 'hours', descriptor: 'LAeq,22:00–06:00', stepMinutes: null },
  });
  const refused: [field: string, limit: object][] = [
    ['windowMinutes', { window: 'length' }],
    ['windowMinutes', { window: 'length', windowMinutes: 50 }],
    ['windowMinutes', { window: 'length', windowMinutes: 7 }],
    ['stepMinutes', { window: 'night', stepMinutes: 5, from: null, to: null }],
    ['stepMinutes', { window: '15min', stepMinutes: 15 }],
    ['from', { window: 'hours', from: null, to: null }],
    ['from', { window: 'hours', from: '22:03', to: '06:00' }],
    ['holidays', { holidays: 'sometimes' }],
  ];
  for (const [field, changes] of refused) {
    const answer = await callApi('POST', path, { session: operator, body: { ...limit, ...changes } });
    expect(answer.status, JSON.stringify(changes)).toBe(422);
    const { fields } = (await answer.json()) as { fields: { field: string }[] };
    expect(fields.map((one) => one.field)).toContain(field);
  }
  expect((await put([{ date: '2026-02-30', name: 'No date' }])).status).toBe(422);
  const twice = { date: '2026-05-01', name: 'May Day' };
  expect((await put([twice, twice])).status).toBe(422);
});

test('a list is read as typed, as pasted from a spreadsheet and as a file of it', () => {
  const expected = { items: [{ date: '2026-12-25', name: 'Christmas Day, observed' }] };
  expect(holidaysOfLines('2026-12-25, Christmas Day, observed\n\n')).toEqual(expected);
  expect(holidaysOfLines('2026-12-25\tChristmas Day, observed')).toEqual(expected);
  expect(holidaysOfLines('Date,Name\r\n"2026-12-25","Christmas Day, observed"\r\n')).toEqual(expected);
  expect(holidaysOfLines(linesOfHolidays(expected.items))).toEqual(expected);
  expect(() => holidaysOfLines('25 December, Christmas')).toThrow();
});
