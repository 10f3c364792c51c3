import { setTimeout as sleep } from 'node:timers/promises';
import { expect, test } from 'vitest';
import { FairShare, NoRoom } from '#lib/http/fairShare';

const BOUNDS = { turnsAtOnce: 2, turnsOfKey: 1, mostOfKey: 4, mostOfAll: 6, longestWaitMs: 60_000 };

/** Work that takes its turn and stays in it until it is let go. */
function stay(share: FairShare, key: string, order: string[]) {
  let letGo: () => void = () => undefined;
  const gone = new Promise<void>((resolve) => (letGo = resolve));
  const done = share.enter(key, (takeTurn) =>
    takeTurn(async () => {
      order.push(key);
      await gone;
    }),
  );
  return { done, letGo };
}

test('turns go round from key to key, however many one key has waiting', async () => {
  const share = new FairShare({ ...BOUNDS, turnsAtOnce: 1 });
  const order: string[] = [];
  const all = ['a', 'a', 'a', 'b', 'c'].map((key) => stay(share, key, order));
  for (const one of all) one.letGo();
  await Promise.all(all.map(({ done }) => done));
  expect(order).toEqual(['a', 'a', 'b', 'c', 'a']);
});

test('one key has no more turns at once than are its own', async () => {
  const share = new FairShare(BOUNDS);
  const order: string[] = [];
  const [first, second] = [stay(share, 'a', order), stay(share, 'a', order)];
  await sleep(1);
  expect(order).toEqual(['a']);
  const other = stay(share, 'b', order);
  await sleep(1);
  expect(order).toEqual(['a', 'b']);
  first.letGo();
  await sleep(1);
  expect(order).toEqual(['a', 'b', 'a']);
  second.letGo();
  other.letGo();
  await Promise.all([first.done, second.done, other.done]);
});

test('beyond its own bound a key is refused, beyond all of them everybody; what leaves makes room', async () => {
  const share = new FairShare(BOUNDS);
  const inside = ['a', 'a', 'a', 'a', 'b', 'c'].map((key) => stay(share, key, []));
  await expect(share.enter('a', async () => undefined)).rejects.toMatchObject({ reason: 'own' });
  await expect(share.enter('d', async () => undefined)).rejects.toMatchObject({ reason: 'all' });
  for (const one of inside) one.letGo();
  await Promise.all(inside.map(({ done }) => done));
  await expect(share.enter('d', async () => 'in')).resolves.toBe('in');
});

test('whoever waits too long is told so and forgotten; what fails hands its turn on', async () => {
  const share = new FairShare({ ...BOUNDS, turnsAtOnce: 1, longestWaitMs: 20 });
  const order: string[] = [];
  const first = stay(share, 'a', order);
  await expect(share.enter('b', (takeTurn) => takeTurn(async () => 'late'))).rejects.toThrow(NoRoom);
  first.letGo();
  await first.done;
  const failing = share.enter('b', (takeTurn) => takeTurn(() => Promise.reject(new Error('no'))));
  await expect(failing).rejects.toThrow('no');
  await expect(share.enter('c', (takeTurn) => takeTurn(async () => 'in'))).resolves.toBe('in');
  expect(order).toEqual(['a']);
});

test('what takes a part of a turn leaves the rest; what takes a whole one is not overtaken for ever', async () => {
  const share = new FairShare({ ...BOUNDS, turnsAtOnce: 1 });
  const order: string[] = [];
  const leave: (() => void)[] = [];
  const enter = (key: string, part: number) =>
    share.enter(key, (takeTurn) =>
      takeTurn(() => {
        order.push(key);
        return new Promise<void>((gone) => leave.push(gone));
      }, part),
    );
  const all = [enter('a', 0.5), enter('b', 0.5), enter('whole', 1), enter('c', 0.5)];
  await sleep(1);
  expect(order).toEqual(['a', 'b']);
  leave[0]?.();
  await sleep(1);
  expect(order).toEqual(['a', 'b']);
  for (let at = 1; at < 4; at += 1) {
    leave[at]?.();
    await sleep(1);
  }
  expect(order).toEqual(['a', 'b', 'whole', 'c']);
  await Promise.all(all);
});

test('whole turns are held back while they shall be, parts of turns go past them, and then they go on', async () => {
  let areHeldBack = true;
  const share = new FairShare({ ...BOUNDS, isHeldBack: (wholeTurns) => areHeldBack || wholeTurns > 0 });
  const order: string[] = [];
  const take = (key: string, part: number) =>
    share.enter(key, (takeTurn) =>
      takeTurn(async () => {
        order.push(key);
        await sleep(1);
      }, part),
    );
  const large = [take('large', 1), take('also large', 1)];
  await take('small', 1 / 4);
  expect(order).toEqual(['small']);
  areHeldBack = false;
  share.goOn();
  await sleep(0);
  expect(order).toEqual(['small', 'large']);
  await Promise.all(large);
  expect(order).toEqual(['small', 'large', 'also large']);
});
