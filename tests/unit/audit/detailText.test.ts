import { expect, test } from 'vitest';
import { detailLines } from '#lib/services/audit/detailText';

test('what changed is told with before and after, what stayed is left out', () => {
  const before = { name: 'Quay', settings: { minimumCoverage: 0.75, excludeRain: false }, roles: [] };
  const after = {
    name: 'Quay Head',
    settings: { minimumCoverage: 0.75, excludeRain: true },
    roles: [{ network: 'merrow', role: 'operator' }],
  };
  expect(detailLines({ before, after, reason: 'as agreed' })).toEqual([
    'name: Quay → Quay Head',
    'settings.excludeRain: no → yes',
    'roles: none → merrow operator',
    'reason: as agreed',
  ]);
});

test('a thing made has no before; an act without details has no lines', () => {
  expect(detailLines({ after: { name: 'Quay', mastHeightM: null } })).toEqual([
    'name: Quay',
    'mastHeightM: none',
  ]);
  expect(detailLines({ before: null, after: { cause: 'people' } })).toEqual(['cause: people']);
  expect(detailLines({ before: { cause: 'people' }, after: null })).toEqual(['cause: people → nothing']);
  expect(detailLines({})).toEqual([]);
});

test('instants are told in UTC, lengths as they are', () => {
  const detail = {
    kind: 'hum',
    from: 1_796_235_000,
    after: { intervalSec: 60, effectiveFromSec: 1_796_236_800 },
  };
  expect(detailLines(detail)).toEqual([
    'intervalSec: 60',
    'effectiveFromSec: 2026-12-02T18:40:00Z',
    'kind: hum',
    'from: 2026-12-02T18:10:00Z',
  ]);
});
