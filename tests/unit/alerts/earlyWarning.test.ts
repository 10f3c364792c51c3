import { expect, test } from 'vitest';
import type { LimitHeadroom } from '#lib/contracts/headroom';
import { isWorthWarning } from '#lib/services/alerts/earlyWarning';

const HOUR: LimitHeadroom = {
  limit: {
    id: 1,
    version: 1,
    name: 'Night',
    metric: 'LAeq',
    descriptor: 'LAeq,1 h',
    threshold: 55,
  },
  from: '2026-03-03T10:00:00Z',
  to: '2026-03-03T11:00:00Z',
  state: 'open',
  level: 57,
  windWords: null,
  seconds: { valid: 1800, missing: 0, awaited: 0, left: 1800, needed: 0 },
  headroom: 50,
  heading: { level: 55.05, from: 'last-15-min' },
  usualHigh: null,
  earliestPassing: null,
};
const seconds = (valid: number, left: number) => ({ ...HOUR.seconds, valid, left });
const heading = (level: number) => ({ level, from: 'last-15-min' as const });

test.each<[string, Partial<LimitHeadroom>, boolean]>([
  ['heading for what rounds to more than the limit', {}, true],
  ['heading for what rounds to the limit', { heading: heading(55.0499) }, false],
  ['heading for exactly the limit', { heading: heading(55) }, false],
  ['heading nowhere known', { heading: null }, false],
  ['certain, however quiet', { state: 'certain', headroom: null, heading: null }, true],
  ['not compared', { state: 'not-compared' }, false],
  ['a moment was above', { state: 'passed' }, false],
  ['a quarter has passed', { seconds: seconds(900, 2700) }, true],
  ['a second less than a quarter has passed', { seconds: seconds(899, 2701) }, false],
  ['5 min of data', { seconds: seconds(300, 1800) }, true],
  ['less than 5 min of data', { seconds: seconds(299, 1800) }, false],
  ['5 min are left', { seconds: seconds(3300, 300) }, true],
  ['less than 5 min are left', { seconds: seconds(3301, 299) }, false],
])('%s', (_, changes, isTold) => {
  expect(isWorthWarning({ ...HOUR, ...changes })).toBe(isTold);
});
