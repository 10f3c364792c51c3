import { setTimeout as sleep } from 'node:timers/promises';
import { expect, test } from 'vitest';
import { Gatherer, type Outcome } from '#ingest/receive/gatherer';

interface Item {
  key: number;
  name: string;
  size?: number;
}

type Together = (names: string[]) => Promise<Outcome<string>[]>;

const doneAll: Together = async (names) => names.map((answer) => ({ kind: 'done', answer }));

/** A gatherer that notes its groups, and what it does alone as a group in brackets. */
function noting(together: Together = doneAll, groupsAtOnce = 1) {
  const groups: string[] = [];
  const gatherer = new Gatherer<Item, string>(
    {
      together: async (items) => {
        groups.push(items.map(({ name }) => name).join(' '));
        await sleep(2);
        return together(items.map(({ name }) => name));
      },
      alone: async ({ name }) => {
        groups.push(`(${name})`);
        if (name.startsWith('bad')) throw new Error(name);
        return name;
      },
      keyOf: ({ key }) => key,
      sizeOf: ({ size = 1 }) => size,
      isHopeless: (error) => (error as Error).message === 'away',
    },
    { groupsAtOnce, mostItems: 3, mostSize: 10 },
  );
  return { groups, takeAll: (items: Item[]) => Promise.allSettled(items.map((item) => gatherer.take(item))) };
}

const items = (...names: string[]) => names.map((name, key) => ({ key, name }));

test('what waits at the same moment makes a group, up to the bounds', async () => {
  const { groups, takeAll } = noting();
  await takeAll([
    ...items('a', 'b', 'c', 'd'),
    { key: 8, name: 'large', size: 9 },
    { key: 9, name: 'huge', size: 99 },
  ]);
  expect(groups).toEqual(['a b c', 'd large', 'huge']);
});

test('a key is in one group at a time, in its order', async () => {
  const { groups, takeAll } = noting(doneAll, 2);
  const own = ['1', '2', '3', '4'].map((name) => ({ key: 1, name }));
  await takeAll([...own, { key: 2, name: 'other' }]);
  expect(groups).toEqual(['1 2 3', 'other', '4']);
});

test('what fails as a group is done one by one, unless nothing else could come of it', async () => {
  const failing = noting(() => Promise.reject(new Error('one of them')));
  const answers = await failing.takeAll(items('a', 'bad', 'c'));
  expect(answers.map(({ status }) => status)).toEqual(['fulfilled', 'rejected', 'fulfilled']);
  expect(failing.groups).toEqual(['a bad c', '(a)', '(bad)', '(c)']);
  const away = noting(() => Promise.reject(new Error('away')));
  expect((await away.takeAll(items('a', 'b'))).map(({ status }) => status)).toEqual(['rejected', 'rejected']);
  expect(away.groups).toEqual(['a b']);
});

test('what a group leaves is done alone, before what comes later of its key', async () => {
  const { groups, takeAll } = noting(async (names) =>
    names.map((answer) => (answer === 'left' ? { kind: 'alone' } : { kind: 'done', answer })),
  );
  const answers = await takeAll([
    { key: 1, name: 'left' },
    ...items('a', '', 'c', 'd').filter(({ key }) => key !== 1),
  ]);
  expect(answers.every(({ status }) => status === 'fulfilled')).toBe(true);
  expect(groups).toEqual(['left a c', '(left)', 'd']);
});
