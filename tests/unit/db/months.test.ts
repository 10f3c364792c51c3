import { expect, test } from 'vitest';
import { missingMonths } from '#db/partitions/months';

const sec = (text: string) => Date.parse(text) / 1000;
const OPEN = { name: 'p_open', endSec: null };

test('months have partitions up to two ahead, across a year’s end', () => {
  const before = { name: 'p_before', endSec: sec('2027-01-01T00:00:00Z') };
  expect(missingMonths([before, OPEN], sec('2026-12-31T23:59:59Z'))).toEqual([
    { name: 'p202701', endSec: sec('2027-02-01T00:00:00Z') },
    { name: 'p202702', endSec: sec('2027-03-01T00:00:00Z') },
  ]);
  const after = [before, ...missingMonths([before, OPEN], sec('2026-12-31T23:59:59Z')), OPEN];
  expect(missingMonths(after, sec('2026-12-31T23:59:59Z'))).toEqual([]);
  expect(missingMonths(after, sec('2027-01-01T00:00:00Z')).map(({ name }) => name)).toEqual(['p202703']);
});

test('months that began while nobody made partitions are made up for; an open table begins with its month', () => {
  const before = { name: 'p_before', endSec: sec('2026-02-01T00:00:00Z') };
  expect(missingMonths([before, OPEN], sec('2026-05-10T00:00:00Z')).map(({ name }) => name)).toEqual([
    'p202602',
    'p202603',
    'p202604',
    'p202605',
    'p202606',
    'p202607',
  ]);
  expect(missingMonths([OPEN], sec('2026-05-10T00:00:00Z'))[0]?.name).toBe('p202605');
});
