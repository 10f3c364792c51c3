import { expect, test } from 'vitest';
import { withLive } from '#components/map/model/withLive.ts';
import type { Station } from '#lib/contracts/stations';

const station = (code: string) =>
  ({ code, name: `Station ${code}`, state: 'silent', overLimit: true, latest: null }) as Station;
const latest = {
  start: '2026-03-01T00:00:00Z',
  seconds: 60,
  LAeq: 52.3,
  LAFmax: null,
  flags: [],
  windSpeed: null,
  battery: null,
  receivedAt: '2026-03-01T00:01:01.000Z',
};

test('what a station has just measured goes to that station and to no other, and keeps what else is known', () => {
  const told = { code: 'MER-02', state: 'live', ...latest } as const;
  const [first, second] = withLive(
    [station('MER-01'), station('MER-02')],
    [{ ...told, state: 'silent', receivedAt: '2026-03-01T00:00:01.000Z' }, told],
  );
  expect(first).toEqual(station('MER-01'));
  expect(second).toEqual({ ...station('MER-02'), state: 'live', latest });
});

test('a station unknown to the page is left to the next answer', () => {
  expect(withLive([station('MER-01')], [{ code: 'MER-99', state: 'live', ...latest }])).toEqual([
    station('MER-01'),
  ]);
});

test('what is known already changes nothing, so that nothing is drawn anew', () => {
  const told = { code: 'MER-01', state: 'live', ...latest } as const;
  const known = withLive([station('MER-01'), station('MER-02')], [told]);
  expect(withLive(known, [told])).toBe(known);
  const [first, second] = withLive(known, [{ ...told, start: '2026-03-01T00:01:00Z' }]);
  expect(first).not.toBe(known[0]);
  expect(second).toBe(known[1]);
});
