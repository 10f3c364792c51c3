import { describe, expect, it } from 'vitest';
import { formatAgo, formatDuration } from '#lib/format/durations';
import { clockChangeWords } from '#lib/format/periods';
import { formatInstant, formatPeriod, formatZone } from '#lib/format/times';

const LONDON = 'Europe/London';
const sec = (iso: string) => Date.parse(iso) / 1000;
const span = (from: string, to: string) => ({ fromSec: sec(from), toSec: sec(to) });

describe('periods in words', () => {
  it.each([
    ['2026-03-17T12:00Z', '2026-03-19T00:00Z', 'Tue 17 March 2026, 12:00 to Wed 18 March, 24:00'],
    ['2026-03-17T12:00Z', '2026-03-17T12:30Z', 'Tue 17 March 2026, 12:00 to 12:30'],
    ['2026-03-17T00:00Z', '2026-03-18T00:00Z', 'Tue 17 March 2026'],
    ['2026-03-16T00:00Z', '2026-03-23T00:00Z', 'Mon 16 March to Sun 22 March 2026'],
    ['2026-03-01T00:00Z', '2026-03-31T23:00Z', 'March 2026'],
    ['2025-12-29T00:00Z', '2026-01-05T00:00Z', 'Mon 29 December 2025 to Sun 4 January 2026'],
    ['2025-12-31T23:00Z', '2026-01-01T07:00Z', 'Wed 31 December 2025, 23:00 to Thu 1 January 2026, 07:00'],
  ])('%s to %s', (from, to, words) => expect(formatPeriod(span(from, to), LONDON)).toBe(words));

  it('tells the two hours of an autumn change apart', () => {
    expect(formatInstant(sec('2026-10-25T00:30Z'), LONDON)).toBe('Sun 25 October 2026, 01:30 BST');
    expect(formatInstant(sec('2026-10-25T01:30Z'), LONDON)).toBe('Sun 25 October 2026, 01:30 GMT');
    expect(formatInstant(sec('2026-10-25T02:30Z'), LONDON)).toBe('Sun 25 October 2026, 02:30');
  });

  it('names the zone with what is in force', () => {
    expect(formatZone(LONDON, span('2026-01-01T00:00Z', '2026-01-02T00:00Z'))).toBe('Europe/London (GMT)');
    expect(formatZone(LONDON, span('2026-03-28T12:00Z', '2026-03-29T12:00Z'))).toBe(
      'Europe/London (GMT, then BST)',
    );
  });

  it('says that the clock changes', () => {
    const night = span('2026-03-28T23:00Z', '2026-03-29T06:00Z');
    expect(clockChangeWords(night, LONDON)).toBe(
      'Clock change on Sun 29 March 2026: that day has 23 h, this period 7 h',
    );
    expect(clockChangeWords(span('2026-03-27T23:00Z', '2026-03-28T07:00Z'), LONDON)).toBeNull();
  });
});

describe('lengths of time', () => {
  it.each([
    [45, '45 s'],
    [900, '15 min'],
    [5400, '1 h 30 min'],
    [36 * 3600, '36 h'],
    [76 * 3600, '3 days 4 h'],
    [31 * 86_400, '31 days'],
  ])('%s s is %s', (durationSec, words) => expect(formatDuration(durationSec)).toBe(words));

  it.each([
    [2, 'just now'],
    [40, '40 s ago'],
    [299, '4 min ago'],
    [5 * 3600, '5 h ago'],
    [12 * 86_400, '12 days ago'],
  ])('%s s ago is %s', (agoSec, words) => expect(formatAgo(1_000_000, 1_000_000 + agoSec)).toBe(words));
});
