import { describe, expect, test } from 'vitest';
import type { CountedComplaint } from '#db/queries/complaintCounts';
import { numbersOf } from '#lib/services/complaints/counts';
import { chanceOfDifference } from '#lib/services/complaints/twoCounts';

const at = (instant: string) => Date.parse(instant) / 1000;
const row = (change: Partial<CountedComplaint> = {}): CountedComplaint => ({
  startsAtSec: at('2026-03-17T03:10:00Z'),
  kind: 'hum',
  area: 'Quay',
  stationCode: 'MER-01',
  source: 'desk',
  status: 'answered',
  closingReason: null,
  createdAt: new Date('2026-03-17T09:00:00Z'),
  answeredAt: new Date('2026-03-20T09:00:00Z'),
  firstDueOn: '2026-03-31',
  hasExceedance: false,
  ...change,
});
const MARCH_TO_MAY = {
  timeZone: 'Europe/London',
  fromSec: at('2026-03-01T00:00:00Z'),
  toSec: at('2026-05-31T23:00:00Z'),
};
const count = (rows: CountedComplaint[], today = '2026-06-01') => numbersOf(rows, MARCH_TO_MAY, today);

describe('numbers', () => {
  test('of nothing are zeros and no median', () => {
    const numbers = count([]);
    expect(numbers).toMatchObject({
      total: 0,
      byMonth: [
        { month: '2026-03', count: 0 },
        { month: '2026-04', count: 0 },
        { month: '2026-05', count: 0 },
      ],
      answers: { answered: 0, medianDays: null, withinDue: { count: 0, of: 0 } },
    });
    expect(numbers.byHour).toHaveLength(24);
  });

  test('months and hours go by the clock of the network, in summer time too', () => {
    const numbers = count([
      row({ startsAtSec: at('2026-03-31T22:59:00Z') }),
      row({ startsAtSec: at('2026-03-31T23:00:00Z') }),
    ]);
    expect(numbers.byMonth.map((one) => one.count)).toEqual([1, 1, 0]);
    expect([numbers.byHour[23], numbers.byHour[0]]).toEqual([1, 1]);
  });

  test('a repeat is told apart and counts for nothing else', () => {
    const repeat = row({
      status: 'closed',
      closingReason: 'repeated',
      answeredAt: null,
      hasExceedance: true,
    });
    expect(count([row(), repeat])).toMatchObject({
      total: 1,
      repeats: 1,
      withExceedance: { count: 0, of: 1 },
    });
  });

  test('answers: the median, and in time up to the end of the due date by the local clock', () => {
    const answered = (instant: string) => row({ answeredAt: new Date(instant), firstDueOn: '2026-04-01' });
    const numbers = count([
      answered('2026-03-18T09:00:00Z'),
      answered('2026-03-20T09:00:00Z'),
      answered('2026-04-01T22:59:00Z'),
      answered('2026-04-01T23:01:00Z'),
      row({ status: 'open', answeredAt: null, firstDueOn: '2026-04-01' }),
      row({ status: 'open', answeredAt: null, firstDueOn: '2026-07-01' }),
      row({ status: 'closed', closingReason: 'withdrawn', answeredAt: null, firstDueOn: '2026-04-01' }),
    ]);
    expect(numbers.answers.answered).toBe(4);
    expect(numbers.answers.medianDays).toBeCloseTo((3 + 15.583) / 2, 2);
    expect(numbers.answers.withinDue).toEqual({ count: 3, of: 5 });
  });

  test('places by the most; without an area last', () => {
    const areas = [null, null, null, 'Quay', 'Mill', 'Mill'];
    expect(count(areas.map((area) => row({ area }))).byArea).toEqual([
      { area: 'Mill', count: 2 },
      { area: 'Quay', count: 1 },
      { area: null, count: 3 },
    ]);
  });
});

describe('two counts over equal times', () => {
  // Tails of the binomial with one half: (1 + 12 + 66) / 2^12; 1 / 2^5; both ways.
  test.each([
    [10, 2, (2 * (1 + 12 + 66)) / 4096],
    [0, 5, 2 / 32],
    [3, 3, 1],
    [0, 0, 1],
  ])('%i and %i', (before, after, chance) => {
    expect(chanceOfDifference(before, after)).toBeCloseTo(chance, 12);
    expect(chanceOfDifference(after, before)).toBeCloseTo(chance, 12);
  });

  test('of thousands', () => {
    expect(chanceOfDifference(2000, 2000)).toBe(1);
    // Normal approximation: 2 (1 − Φ((2200 − 2000 − 1) / √4200)) = 0.00213.
    expect(chanceOfDifference(2200, 2000)).toBeCloseTo(0.00213, 4);
  });
});
