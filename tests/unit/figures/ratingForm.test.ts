import { describe, expect, test } from 'vitest';
import { readRatingEntry } from '#lib/services/figures/ratingForm';

const read = (query: string) => readRatingEntry(new URLSearchParams(query));

describe('adjustments from an address', () => {
  test('are taken with a reason, a decimal comma too', () => {
    expect(read('tonal=2,5&tonalReason=hum+at+100+Hz&background=41.2')).toMatchObject({
      adjustments: [{ kind: 'tonal', adjustmentDb: 2.5, reason: 'hum at 100 Hz' }],
      backgroundDb: 41.2,
      problems: {},
    });
    expect(read('')).toMatchObject({ adjustments: [], backgroundDb: null, problems: {} });
    expect(read('tonal=0')).toMatchObject({ adjustments: [], problems: {} });
  });

  test.each([
    ['tonal=4', 'tonalReason'],
    ['tonal=7&tonalReason=hum', 'tonal'],
    ['impulsive=-1&impulsiveReason=bang', 'impulsive'],
    ['other=loud&otherReason=x', 'other'],
    ['intermittent=1e1&intermittentReason=x', 'intermittent'],
    ['background=quiet', 'background'],
    ['background=900', 'background'],
  ])('%s is not reckoned with, told at its field and kept', (query, field) => {
    const entry = read(query);
    expect(entry.adjustments).toEqual([]);
    expect(entry.backgroundDb).toBeNull();
    expect(Object.keys(entry.problems)).toEqual([field]);
    expect(Object.values(entry.values)).toContain(query.split('&')[0]?.split('=')[1]);
  });
});
