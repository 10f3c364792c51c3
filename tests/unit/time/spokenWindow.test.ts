import { describe, expect, test } from 'vitest';
import { spokenWindow } from '#lib/time/spokenWindow';

const ZONE = 'Europe/London';
const at = (instant: string) => Date.parse(instant) / 1000;
const meant = (text: string, now: string, zone = ZONE) => {
  const window = spokenWindow(text, zone, at(now));
  return (
    window && [window.fromSec, window.toSec].map((sec) => new Date(sec * 1000).toISOString().slice(0, 16))
  );
};

describe('said on Tuesday 17 March 2026 at 09:12', () => {
  const NOW = '2026-03-17T09:12:00Z';
  test.each([
    ['now', '2026-03-17T08:42', '2026-03-17T09:12'],
    ['now 2h', '2026-03-17T07:12', '2026-03-17T09:12'],
    ['last night about 3', '2026-03-17T02:30', '2026-03-17T03:30'],
    ['Last night at 3:40 am', '2026-03-17T03:10', '2026-03-17T04:10'],
    ['ln 23', '2026-03-16T22:30', '2026-03-16T23:30'],
    ['last night from 22:30 to 1', '2026-03-16T22:30', '2026-03-17T01:00'],
    ['yesterday 14:30-15', '2026-03-16T14:30', '2026-03-16T15:00'],
    ['3', '2026-03-17T02:30', '2026-03-17T03:30'],
    ['23:00', '2026-03-16T22:30', '2026-03-16T23:30'],
    ['11pm', '2026-03-16T22:30', '2026-03-16T23:30'],
    ['today 9', '2026-03-17T08:30', '2026-03-17T09:12'],
    ['mon 22-1', '2026-03-16T22:00', '2026-03-17T01:00'],
    ['tuesday 10', '2026-03-10T09:30', '2026-03-10T10:30'],
    ['sunday noon', '2026-03-15T11:30', '2026-03-15T12:30'],
    ['14 mar 0310', '2026-03-14T02:40', '2026-03-14T03:40'],
    ['14.3. 3:10 – 3:40', '2026-03-14T03:10', '2026-03-14T03:40'],
    ['20 March 3', '2025-03-20T02:30', '2025-03-20T03:30'],
    ['2026-03-10 03:10-03:40', '2026-03-10T03:10', '2026-03-10T03:40'],
    ['midnight', '2026-03-16T23:30', '2026-03-17T00:30'],
  ])('%s', (text, from, to) => {
    expect(meant(text, NOW)).toEqual([from, to]);
  });

  test.each([
    '',
    'soon',
    'today 15',
    '25',
    '3:77',
    '31 feb 3',
    '13pm',
    'now 0',
    'last night',
    '2026-04-01 3',
  ])('not understood, or not yet come: “%s”', (text) => {
    expect(meant(text, NOW)).toBeNull();
  });
});

test('in the small hours “last night” at eleven was yesterday, and at two it was just now', () => {
  expect(meant('last night 23', '2026-03-17T02:30:00Z')).toEqual(['2026-03-16T22:30', '2026-03-16T23:30']);
  expect(meant('last night 2', '2026-03-17T02:10:00Z')).toEqual(['2026-03-17T01:30', '2026-03-17T02:10']);
  expect(meant('last night 3', '2026-03-17T02:10:00Z')).toEqual(['2026-03-16T02:30', '2026-03-16T03:30']);
});

test('of the hour that comes twice both are taken in; what is skipped is just after', () => {
  expect(meant('1:30', '2026-10-25T09:00:00Z')).toEqual(['2026-10-25T00:00', '2026-10-25T02:00']);
  expect(meant('1:30', '2026-03-29T09:00:00Z')).toEqual(['2026-03-29T01:00', '2026-03-29T02:00']);
});

test('in another zone', () => {
  expect(meant('last night about 3', '2026-07-17T22:00:00Z', 'Pacific/Auckland')).toEqual([
    '2026-07-17T14:30',
    '2026-07-17T15:30',
  ]);
});
