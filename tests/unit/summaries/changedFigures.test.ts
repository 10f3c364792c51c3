import { expect, test } from 'vitest';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { changedFigures } from '#lib/services/summaries/life/changedFigures';

/** As much of a month as its comparison looks at. */
function month(stations: object[], more: object = {}): MonthDocument {
  return {
    generatedAt: String(Math.random()),
    complaints: { open: 1 },
    limits: [],
    stations,
    ...more,
  } as never;
}

const station = (code: string, more: object) => ({ code, name: code, ...more });

test('the same figures, computed in another order, at another time, are no change', () => {
  const old = month([station('A', { figures: { LAeq: 52.1, LA10: null } })]);
  const now = month([station('A', { figures: { LAeq: 52.1 + 4e-7, LA10: null } })]);
  expect(changedFigures(old, { ...now, complaints: { open: 0, answered: 1, closed: 0 } })).toEqual([]);
});

test('a level that appears, one that goes, one that moves', () => {
  const old = month([station('A', { figures: { LAeq: 52.1, LA10: null, LA90: 40 } })]);
  const now = month([station('A', { figures: { LAeq: 52.1002, LA10: 55, LA90: null } })]);
  expect(changedFigures(old, now)).toEqual([
    { station: 'A', figure: 'figures LAeq', old: 52.1, new: 52.1002 },
    { station: 'A', figure: 'figures LA10', old: null, new: 55 },
    { station: 'A', figure: 'figures LA90', old: 40, new: null },
  ]);
});

test('items are told apart by what they are of: one that comes in between shifts no other', () => {
  const day = (date: string, Lday: number) => ({ date, Lday });
  const old = month([station('A', { days: [day('2026-03-01', 50), day('2026-03-03', 51)] })]);
  const now = month([
    station('A', { days: [day('2026-03-01', 50), day('2026-03-02', 60), day('2026-03-03', 51)] }),
  ]);
  expect(changedFigures(old, now).map(({ figure }) => figure)).toEqual([
    'days 2026-03-02 date',
    'days 2026-03-02 Lday',
  ]);
});

test('the hour that comes twice is two hours', () => {
  const hour = (turn: number, LAeq: number) => ({ date: '2026-10-25', hour: 1, turn, LAeq });
  const old = month([station('A', { hours: [hour(0, 40), hour(1, 41)] })]);
  const now = month([station('A', { hours: [hour(0, 40), hour(1, 45)] })]);
  expect(changedFigures(old, now)).toEqual([
    { station: 'A', figure: 'hours 2026-10-25 1:00 again LAeq', old: 41, new: 45 },
  ]);
});

test('a station that came or went, and limits of the network', () => {
  const old = month([station('A', { figures: { LAeq: 50 } })], {
    limits: [{ id: 7, version: 1, threshold: 55 }],
  });
  const now = month([station('B', { figures: { LAeq: 50 } })], {
    limits: [{ id: 7, version: 2, threshold: 50 }],
  });
  const found = changedFigures(old, now);
  expect(found.filter(({ station: code }) => code === null).map(({ figure }) => figure)).toContain(
    'limits 7 version 2 threshold',
  );
  expect(found).toContainEqual({ station: 'A', figure: 'figures LAeq', old: 50, new: null });
  expect(found).toContainEqual({ station: 'B', figure: 'figures LAeq', old: null, new: 50 });
});

test('what a month was issued before anybody was told of is no change; that it changes later is one', () => {
  const year = (U: object | null) => month([station('A', { yearToDate: { LAeq: 50, U } })]);
  expect(changedFigures(year(null), year({ LAeq: 1.2 }))).toEqual([]);
  expect(changedFigures(year({ LAeq: 1.1 }), year({ LAeq: 1.2 }))).toEqual([
    { station: 'A', figure: 'yearToDate U LAeq', old: 1.1, new: 1.2 },
  ]);
});
