import { expect, test } from 'vitest';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson } from '../support/people';
import { givePassword, meStatus, signInStatus } from './support';

/** One a second, ten at once. */
process.env['BITTERN_REQUESTS_PER_MINUTE_ACCOUNT'] = '60';
useFreshSchema();

test('above its pace an account waits, by browser and token alike; others, and signing in, do not', async () => {
  const networkId = await makeNetwork('home');
  const { userId, session } = await makePerson(networkId, ['operator']);
  const email = await givePassword(userId, 'a heron in the reeds');
  const made = await callApi('POST', '/api/v1/me/tokens', { session, body: { name: 'script', days: 7 } });
  const { token } = await made.json();

  const statuses: number[] = [];
  for (let n = 0; n < 30; n += 1) statuses.push(await meStatus(n % 2 === 0 ? { session } : { token }));
  expect(statuses.slice(0, 8)).toEqual(Array(8).fill(200));
  expect(statuses.filter((status) => status === 429).length).toBeGreaterThan(5);
  for (let n = 0; n < 10; n += 1) await meStatus({ session });
  const refused = await callApi('GET', '/api/v1/networks/home/stations', { session });
  expect([refused.status, Number(refused.headers.get('retry-after'))]).toEqual([429, 1]);

  const other = await makePerson(networkId, ['operator']);
  expect(await meStatus(other)).toBe(200);
  expect(await signInStatus(email, 'a heron in the reeds')).toBe(204);
});
