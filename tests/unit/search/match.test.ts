import { describe, expect, test } from 'vitest';
import { matchScore, wordsOf } from '#lib/services/search/match';

const score = (text: string, label: string, terms?: string) => matchScore(wordsOf(text), label, terms);

describe('words', () => {
  test('case, accents and what divides words make no difference', () => {
    expect(wordsOf('  MER-01, Café\tQuai ')).toEqual(['mer', '01', 'cafe', 'quai']);
  });
});

describe('a match', () => {
  test('needs every word', () => {
    expect(score('north quay', 'North Quay')).toBeGreaterThan(0);
    expect(score('north pier', 'North Quay')).toBe(0);
  });

  test('no words match everything alike', () => {
    expect(score('', 'Map')).toBe(1);
    expect(score(' - ', 'Stations')).toBe(1);
  });

  test('the label comes before other words for it, its beginning before its middle', () => {
    const whole = score('limits', 'Limits');
    const beginning = score('lim', 'Limits');
    const later = score('set', 'Calibration settings');
    const term = score('threshold', 'Limits', 'thresholds');
    const within = score('atio', 'Stations');
    expect([whole, beginning, later, term, within]).toEqual([9, 6, 5, 3, 2]);
  });

  test('one letter matches only where a word begins', () => {
    expect(score('t', 'Stations')).toBe(0);
  });
});
