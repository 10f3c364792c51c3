import { expect, test } from 'vitest';
import { bucketsOfWorker } from '#ingest/sharing/shareOut';

const ALL = Array.from({ length: 64 }, (_, bucket) => bucket);
const WORKERS = ['one', 'two', 'three'];

const sharesOf = (workers: readonly string[]) =>
  new Map(workers.map((id) => [id, bucketsOfWorker(id, workers)]));

test('one alone has every bucket', () => {
  expect(bucketsOfWorker('one', ['one'])).toEqual(ALL);
});

test('three have every bucket once, each about a third, in whatever order they know each other', () => {
  const shares = sharesOf(WORKERS);
  expect([...shares.values()].flat().sort((a, b) => a - b)).toEqual(ALL);
  for (const share of shares.values()) expect(share.length).toBeGreaterThan(8);
  expect(sharesOf([...WORKERS].reverse()).get('two')).toEqual(shares.get('two'));
});

test('when one dies, the others keep what they had', () => {
  const before = sharesOf(WORKERS);
  const after = sharesOf(['one', 'three']);
  expect([...after.values()].flat().sort((a, b) => a - b)).toEqual(ALL);
  for (const id of ['one', 'three'])
    expect(after.get(id)).toEqual(expect.arrayContaining(before.get(id) ?? []));
});
