import { describe, expect, test } from 'vitest';
import { DEFAULT_PREFERENCES, type AlertPreferences } from '#db/queries/alertPreferences';
import { alertDueSec } from '#lib/services/alerts/dueAt';

const LONDON = 'Europe/London';
const at = (text: string) => Date.parse(text) / 1000;

function due(
  changes: Partial<AlertPreferences>,
  now: string,
  moment: { last?: string; excessTenths?: number } = {},
  zone = LONDON,
): string {
  const { last, excessTenths = 10 } = moment;
  const sec = alertDueSec(
    { ...DEFAULT_PREFERENCES, ...changes },
    { nowSec: at(now), lastToldSec: last ? at(last) : null, excessTenths },
    zone,
  );
  return new Date(sec * 1000).toISOString().replace('.000Z', 'Z');
}

const night = { quietFromMin: 22 * 60, quietToMin: 6 * 60 };

test('the first is told at once, a burst together when the least distance is over', () => {
  const spaced = { groupMin: 10 };
  expect(due(spaced, '2026-02-03T12:00:05Z')).toBe('2026-02-03T12:00:05Z');
  expect(due(spaced, '2026-02-03T12:03:00Z', { last: '2026-02-03T12:00:05Z' })).toBe('2026-02-03T12:10:05Z');
  expect(due(spaced, '2026-02-03T12:10:05Z', { last: '2026-02-03T12:00:05Z' })).toBe('2026-02-03T12:10:05Z');
  expect(due({ groupMin: 0 }, '2026-02-03T12:03:00Z', { last: '2026-02-03T12:03:00Z' })).toBe(
    '2026-02-03T12:03:00Z',
  );
});

describe('digests', () => {
  test('the full hour of the wall, also where the zone is half an hour off', () => {
    expect(due({ delivery: 'hourly' }, '2026-02-03T12:00:00Z')).toBe('2026-02-03T13:00:00Z');
    expect(due({ delivery: 'hourly' }, '2026-02-03T12:59:59Z')).toBe('2026-02-03T13:00:00Z');
    expect(due({ delivery: 'hourly' }, '2026-02-03T12:10:00Z', {}, 'Asia/Kolkata')).toBe(
      '2026-02-03T12:30:00Z',
    );
  });

  test('the hour of the day by civil time, over both clock changes', () => {
    const daily = { delivery: 'daily', dailyAtMin: 7 * 60 } as const;
    expect(due(daily, '2026-02-03T06:59:59Z')).toBe('2026-02-03T07:00:00Z');
    expect(due(daily, '2026-02-03T07:00:00Z')).toBe('2026-02-04T07:00:00Z');
    expect(due(daily, '2026-03-28T12:00:00Z')).toBe('2026-03-29T06:00:00Z');
    expect(due(daily, '2026-10-24T12:00:00Z')).toBe('2026-10-25T07:00:00Z');
  });

  test('a digest whose time the spring change skips comes when the clock has gone on', () => {
    const daily = { delivery: 'daily', dailyAtMin: 90 } as const;
    expect(due(daily, '2026-03-28T12:00:00Z')).toBe('2026-03-29T01:30:00Z');
  });
});

describe('quiet hours', () => {
  test('over midnight: exact at both edges', () => {
    expect(due(night, '2026-02-03T21:59:59Z')).toBe('2026-02-03T21:59:59Z');
    expect(due(night, '2026-02-03T22:00:00Z')).toBe('2026-02-04T06:00:00Z');
    expect(due(night, '2026-02-04T05:59:59Z')).toBe('2026-02-04T06:00:00Z');
    expect(due(night, '2026-02-04T06:00:00Z')).toBe('2026-02-04T06:00:00Z');
  });

  test('by the clock on the wall when it changes in the night', () => {
    expect(due(night, '2026-03-28T23:00:00Z')).toBe('2026-03-29T05:00:00Z');
    expect(due(night, '2026-10-24T22:00:00Z')).toBe('2026-10-25T06:00:00Z');
  });

  test('an end that the spring change skips is over as soon as the clock has passed it', () => {
    const early = { quietFromMin: 23 * 60, quietToMin: 90 };
    expect(due(early, '2026-03-29T00:40:00Z')).toBe('2026-03-29T01:00:00Z');
  });

  test('an hour that comes twice is quiet both times', () => {
    const early = { quietFromMin: 23 * 60, quietToMin: 105 };
    expect(due(early, '2026-10-25T00:10:00Z')).toBe('2026-10-25T00:45:00Z');
    expect(due(early, '2026-10-25T01:10:00Z')).toBe('2026-10-25T01:45:00Z');
  });

  test('a digest within them waits for their end', () => {
    expect(due({ ...night, delivery: 'daily', dailyAtMin: 5 * 60 }, '2026-02-03T12:00:00Z')).toBe(
      '2026-02-04T06:00:00Z',
    );
  });

  test('the override: exactly so many tenths are told at once, one less waits, and so does what is no longer above', () => {
    const severe = { ...night, delivery: 'hourly', overrideTenths: 100, groupMin: 10 } as const;
    expect(due(severe, '2026-02-04T03:00:00Z', { excessTenths: 100 })).toBe('2026-02-04T03:00:00Z');
    expect(due(severe, '2026-02-04T03:00:00Z', { excessTenths: 99 })).toBe('2026-02-04T06:00:00Z');
    const moment = { nowSec: at('2026-02-04T03:00:00Z'), lastToldSec: null, excessTenths: null };
    expect(alertDueSec({ ...DEFAULT_PREFERENCES, ...severe }, moment, LONDON)).toBe(
      at('2026-02-04T06:00:00Z'),
    );
    expect(due(severe, '2026-02-04T03:00:00Z', { excessTenths: 100, last: '2026-02-04T02:55:00Z' })).toBe(
      '2026-02-04T03:05:00Z',
    );
  });
});
