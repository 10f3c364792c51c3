import { describe, expect, it } from 'vitest';
import { clockStretchWords, stretchWords } from '../../../src/components/strip/model/timeWords';

const run = (from: string, to: string) => ({
  fromSec: Date.parse(from) / 1000,
  toSec: Date.parse(to) / 1000,
});
const LONDON = 'Europe/London';

describe('stretches of time in words', () => {
  it.each([
    ['2026-03-17T20:58Z', '2026-03-17T22:04Z', 'Tue 17 Mar 20:58–22:04'],
    ['2026-03-17T20:58Z', '2026-03-18T00:00Z', 'Tue 17 Mar 20:58–24:00'],
    ['2026-03-17T22:58Z', '2026-03-18T01:04Z', 'Tue 17 Mar 22:58 – Wed 18 Mar 01:04'],
    ['2026-03-17T12:00Z', '2026-03-19T00:00Z', 'Tue 17 Mar 12:00 – Wed 18 Mar 24:00'],
    ['2026-07-01T20:58Z', '2026-07-01T21:04:07Z', 'Wed 1 Jul 21:58–22:04:07'],
  ])('from %s to %s', (from, to, words) => expect(stretchWords(run(from, to), LONDON)).toBe(words));

  it('can do without the dates', () => {
    expect(clockStretchWords(run('2026-03-17T22:40Z', '2026-03-18T07:10Z'), LONDON)).toBe('22:40–07:10');
    expect(clockStretchWords(run('2026-01-01T00:00Z', '2026-07-16T12:00Z'), LONDON)).toBe(
      'Thu 1 Jan – Thu 16 Jul',
    );
  });
});
