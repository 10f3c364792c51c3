import { expect, test } from 'vitest';
import { SignInBudgets } from '#lib/auth/signInBudgets';
import { Throttle } from '#lib/auth/throttle';

const pace = { free: 3, firstSec: 10, mostSec: 60, forgetSec: 600 };

test('each further try waits twice as long, up to the longest, and time forgets', () => {
  const throttle = new Throttle(pace);
  const waits = Array.from({ length: 7 }, () => {
    throttle.count('a', 0);
    return throttle.waitSec('a', 0);
  });
  expect(waits).toEqual([0, 0, 10, 20, 40, 60, 60]);
  expect(throttle.waitSec('a', 59_500)).toBe(1);
  expect(throttle.waitSec('a', 60_000)).toBe(0);
  throttle.count('a', 60_000);
  expect(throttle.waitSec('a', 60_000)).toBe(60);
  throttle.count('a', 700_000);
  expect(throttle.waitSec('a', 700_000)).toBe(0);
});

test('tries at the same moment count before any has ended; one key is not another', () => {
  const budgets = new SignInBudgets();
  const trying = { account: 'a', address: '192.0.2.1', ownDevice: null };
  const begun = Array.from({ length: 40 }, () => budgets.begin(trying, 0));
  expect(begun.filter((wait) => wait === 0)).toHaveLength(5);
  expect(budgets.begin({ ...trying, address: '192.0.2.2' }, 0)).toBe(0);
  expect(budgets.begin({ ...trying, ownDevice: 'mine' }, 0)).toBe(0);
});

test('one address that tries many accounts has to wait, and a known browser there has not', () => {
  const budgets = new SignInBudgets();
  const waits = Array.from({ length: 80 }, (_, n) =>
    budgets.begin({ account: `account ${n}`, address: '192.0.2.1', ownDevice: null }, 0),
  );
  expect(waits.filter((wait) => wait === 0)).toHaveLength(60);
  expect(budgets.begin({ account: 'mine', address: '192.0.2.1', ownDevice: 'mine' }, 0)).toBe(0);
});

test('signing in with one’s own account between guesses does not buy further guesses', () => {
  const budgets = new SignInBudgets();
  let allowed = 0;
  for (let n = 0; n < 200; n += 1) {
    const own = { account: 'own', address: '192.0.2.1', ownDevice: null };
    if (budgets.begin(own, 0) === 0) budgets.succeed(own, 0);
    if (budgets.begin({ account: `victim ${n}`, address: '192.0.2.1', ownDevice: null }, 0) === 0)
      allowed += 1;
  }
  expect(allowed).toBeLessThanOrEqual(60);
});
