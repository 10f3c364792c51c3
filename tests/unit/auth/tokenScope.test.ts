import { readdirSync } from 'node:fs';
import { expect, test } from 'vitest';
import { familyOf, requireScope } from '#lib/auth/tokenScope';

/** Families leave these out: what is found is of every family; rules of signing in and what is deleted are for administrators. */
const OF_NO_FAMILY = ['index', 'retention', 'search', 'sign-in-rules'];

test('every route within a network has a family, or is one of those that have none', () => {
  const names = readdirSync('src/pages/api/v1/networks/[network]').map((name) => name.replace(/\..*$/, ''));
  const without = [...new Set(names)].filter((name) => familyOf(`/api/v1/networks/n/${name}`) === null);
  expect(without.sort()).toEqual(OF_NO_FAMILY);
});

test.each(['/api/v1/people', '/admin/audit.csv', '/n/home/complaints', '/api/v1/networks/home/search'])(
  'a token of families does not open %s',
  (path) => {
    const scope = { access: 'change', families: ['complaints', 'stations'] } as const;
    expect(() => requireScope(scope, 'GET', path)).toThrow(/alone/);
    expect(() => requireScope({ access: 'read', families: null }, 'GET', path)).not.toThrow();
  },
);
