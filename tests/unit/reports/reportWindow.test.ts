import { describe, expect, test } from 'vitest';
import type { TypedReport } from '#lib/contracts/reports';
import { reportWindow } from '#lib/services/reports/reportWindow';

const ZONE = 'Europe/London';
const at = (instant: string) => Date.parse(instant) / 1000;
const NOW = at('2026-11-10T09:20:00Z');

const typed = (fields: Partial<TypedReport>): TypedReport => ({
  when: '',
  lasting: '',
  day: '',
  clock: '',
  from: '',
  to: '',
  kind: '',
  words: '',
  area: '',
  place: '',
  name: '',
  email: '',
  phone: '',
  address: '',
  consent: '',
  effects: [],
  ...fields,
});

function windowOf(fields: Partial<TypedReport>, nowSec = NOW): [string, string] {
  const outcome = reportWindow(typed(fields), ZONE, nowSec);
  if (!outcome.isClear) throw new Error(JSON.stringify(outcome.faults));
  const { fromSec, toSec } = outcome.window;
  return [fromSec, toSec].map((sec) => new Date(sec * 1000).toISOString()) as [string, string];
}

function faultsOf(fields: Partial<TypedReport>) {
  const outcome = reportWindow(typed(fields), ZONE, NOW);
  return outcome.isClear ? {} : outcome.faults;
}

describe('plain choices become a window', () => {
  test('now, for an hour so far', () => {
    expect(windowOf({ when: 'now', lasting: '60' })).toEqual([
      '2026-11-10T08:20:00.000Z',
      '2026-11-10T09:20:00.000Z',
    ]);
  });

  test('last night about three is the morning after that evening', () => {
    const expected = ['2026-11-10T02:30:00.000Z', '2026-11-10T03:30:00.000Z'];
    expect(windowOf({ when: 'about', day: 'night-2026-11-09', clock: '3' })).toEqual(expected);
    expect(windowOf({ when: 'about', day: 'night-2026-11-09', clock: '03:00' })).toEqual(expected);
  });

  test('last night about eleven is that evening', () => {
    expect(windowOf({ when: 'about', day: 'night-2026-11-09', clock: '23:00' })).toEqual([
      '2026-11-09T22:30:00.000Z',
      '2026-11-09T23:30:00.000Z',
    ]);
  });

  test('what is about now ends now', () => {
    expect(windowOf({ when: 'about', day: '2026-11-10', clock: '9:10' })[1]).toBe('2026-11-10T09:20:00.000Z');
  });
});

describe('clock changes', () => {
  test('the hour that comes twice is covered twice', () => {
    expect(windowOf({ when: 'about', day: 'night-2026-10-24', clock: '1:30' })).toEqual([
      '2026-10-25T00:00:00.000Z',
      '2026-10-25T02:00:00.000Z',
    ]);
    expect(windowOf({ when: 'exact', from: '2026-10-25T01:15', to: '2026-10-25T01:45' })).toEqual([
      '2026-10-25T00:15:00.000Z',
      '2026-10-25T01:45:00.000Z',
    ]);
  });

  test('an end that seems to lie before the beginning may be right in that hour', () => {
    expect(windowOf({ when: 'exact', from: '2026-10-25T01:40', to: '2026-10-25T01:20' })).toEqual([
      '2026-10-25T00:40:00.000Z',
      '2026-10-25T01:20:00.000Z',
    ]);
  });

  test('a time that the spring change skips is taken just after it', () => {
    expect(windowOf({ when: 'about', day: '2026-03-29', clock: '1:30' })).toEqual([
      '2026-03-29T01:00:00.000Z',
      '2026-03-29T02:00:00.000Z',
    ]);
  });
});

test.each([
  [{}, { when: 'choose' }],
  [{ when: 'now', lasting: '7' }, { lasting: 'choose' }],
  [{ when: 'about', day: '2026-11-09', clock: 'three' }, { clock: 'unreadable-clock' }],
  [{ when: 'about', day: '2026-02-30', clock: '3' }, { day: 'choose' }],
  [{ when: 'about', day: '2026-11-10', clock: '15:00' }, { clock: 'future' }],
  [{ when: 'about', day: '2024-11-10', clock: '15:00' }, { day: 'too-long-ago' }],
  [
    { when: 'exact', from: '', to: 'x' },
    { from: 'unreadable-time', to: 'unreadable-time' },
  ],
  [{ when: 'exact', from: '2026-11-09T05:00', to: '2026-11-09T04:00' }, { to: 'ends-before' }],
  [{ when: 'exact', from: '2026-11-11T05:00', to: '2026-11-11T06:00' }, { from: 'future' }],
  [{ when: 'exact', from: '2026-11-01T05:00', to: '2026-11-09T06:00' }, { to: 'too-long-window' }],
] as [Partial<TypedReport>, object][])('%j is told as %j', (fields, faults) => {
  expect(faultsOf(fields)).toEqual(faults);
});
