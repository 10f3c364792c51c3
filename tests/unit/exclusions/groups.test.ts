import { expect, test } from 'vitest';
import { groupsOf } from '#components/exclusions/groups.ts';
import { reasonWords } from '#components/exclusions/reasons.ts';
import { type Exclusion } from '#lib/contracts/exclusions';

const BASE = {
  from: '2026-03-01T00:00:00Z',
  to: '2026-03-01T06:00:00Z',
  reason: 'Storm',
  createdAt: '2026-03-02T08:00:00Z',
  createdBy: 'Ines',
};
const WITHDRAWN = { at: '2026-03-03T08:00:00Z', by: 'Ines', reason: 'no' };

function exclusion(id: number, station: string, act: number | null, isStanding = true): Exclusion {
  return { ...BASE, id, station, act, withdrawal: isStanding ? null : WITHDRAWN };
}

test('those of one act stand together by station, others alone, in the order of the list', () => {
  const groups = groupsOf([
    exclusion(9, 'C', 7, false),
    exclusion(12, 'A', null),
    exclusion(8, 'B', 7),
    exclusion(7, 'A', 7),
    exclusion(3, 'A', null, false),
  ]);
  expect(groups.map(({ members }) => members.map(({ id }) => id))).toEqual([[7, 8, 9], [12], [3]]);
  expect(groups.map(({ standing }) => standing.map(({ station }) => station))).toEqual([
    ['A', 'B'],
    ['A'],
    [],
  ]);
});

test('a reason is the listed one with own words after it; something else is own words alone', () => {
  expect(reasonWords('storm', '')).toBe('Storm or heavy rain');
  expect(reasonWords('storm', 'gusts')).toBe('Storm or heavy rain: gusts');
  expect(reasonWords('other', 'a balloon')).toBe('a balloon');
});
