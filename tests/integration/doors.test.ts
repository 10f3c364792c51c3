import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { insertStationToken } from '#db/queries/stationTokens';
import { callApi, methodsOf, routePatterns } from './support/callApi';
import { useFreshSchema } from './support/freshSchema';
import { makeNetwork, makePerson, makeStation } from './support/people';

/** Every route of the interface is knocked at by every role with every kind of wrong input: a clear 4xx, never a 5xx. */
useFreshSchema();

/** Routes that anybody may call, or that have a token of their own. */
const OPEN_ROUTES = [
  '/api/v1/openapi.json',
  '/api/v1/session',
  '/api/v1/invitations/acceptance',
  '/api/v1/password-links',
  '/api/v1/password-links/use',
  '/api/v1/intervals',
  '/api/v1/intervals/last',
  '/api/v1/weather',
  '/api/v1/summaries/verify',
  '/api/v1/summaries/keys',
  '/api/v1/summaries/keys/[key]',
];

const NAMES: Record<string, string> = {
  network: 'doors',
  code: 'DR-1',
  id: '1',
  reference: 'DOORS-2026-0001',
  file: '2026-03.csv',
  month: '2026-03',
  key: 'ab'.repeat(32),
};

const BODIES: [what: string, body: string | undefined, contentType: string][] = [
  ['nothing', undefined, 'application/json'],
  ['broken JSON', '{"from":', 'application/json'],
  ['a list', '[]', 'application/json'],
  ['null', 'null', 'application/json'],
  ['an empty object', '{}', 'application/json'],
  ['another type', '{}', 'text/plain'],
  [
    'wrong types',
    '{"from":5,"to":[],"name":{},"code":true,"reason":0,"bands":"x","intervals":7,"email":1,"password":[]}',
    'application/json',
  ],
  [
    'extremes',
    `{"from":"9999-99-99","to":"-1","name":"${'x'.repeat(5000)}","threshold":1e308,"latitude":1e9,"seconds":-1}`,
    'application/json',
  ],
  [
    'the prototype',
    '{"__proto__":{"isAdministrator":true},"constructor":{"prototype":{"x":1}}}',
    'application/json',
  ],
  [
    'text that means something elsewhere',
    `{"reason":"'; DROP TABLE users; --","name":"<script>alert(1)</script>","email":"a@b.example\\r\\nBcc: c@d.example"}`,
    'application/json',
  ],
  ['deep nesting', `{"a":${'['.repeat(5000)}${']'.repeat(5000)}}`, 'application/json'],
];

const QUERIES = [
  '',
  '?from=yesterday&to=today',
  '?from=2026-03-02T00:00:00Z&to=2026-03-01T00:00:00Z',
  '?from=2026-03-01T00:00:00Z',
  '?from=2026-02-30T00:00:00Z&to=2026-03-01T00:00:00Z',
  '?from=1900-01-01T00:00:00Z&to=2300-01-01T00:00:00Z',
  '?from=2026-13-01&to=2026-99-99',
  '?from=2026-03-01T00:00:00Z&to=2026-03-02T00:00:00Z&limit=-1',
  '?from=2026-03-01T00:00:00Z&to=2026-03-02T00:00:00Z&limit=1e9&columns=0',
  '?from=2026-03-01T00:00:00Z&to=2026-03-02T00:00:00Z&cursor=%00%ff..',
  '?from=2026-03-01T00:00:00Z&to=2026-03-02T00:00:00Z&validity=perhaps&state=odd&station=%27',
];

interface Caller {
  who: string;
  call: { session?: string; token?: string };
}

let callers: Caller[];

beforeAll(async () => {
  const home = await makeNetwork('doors');
  const foreign = await makeNetwork('foreign');
  const stationId = await makeStation(home, 'DR-1');
  const token = await inTransaction((transaction) => insertStationToken(stationId, null, transaction));
  callers = [
    { who: 'nobody', call: {} },
    { who: 'a foreign operator', call: { session: (await makePerson(foreign, ['operator'])).session } },
    { who: 'the regulator', call: { session: (await makePerson(home, ['regulator'])).session } },
    { who: 'the liaison', call: { session: (await makePerson(home, ['liaison'])).session } },
    { who: 'the operator', call: { session: (await makePerson(home, ['operator'])).session } },
    { who: 'the administrator', call: { session: (await makePerson(null, [], true)).session } },
    { who: 'a station', call: { token } },
  ];
});

function pathOf(pattern: string): string {
  return pattern.replace(/\[(?:\.\.\.)?(\w+)\]/g, (_, name: string) => NAMES[name] ?? 'x');
}

async function expectClear(response: Response, told: string): Promise<void> {
  expect(
    response.status,
    `${told}: ${response.status >= 500 ? await response.clone().text() : ''}`,
  ).toBeLessThan(500);
  if (response.status >= 400) {
    expect(response.headers.get('content-type'), told).toBe('application/problem+json');
    expect(await response.json(), told).toMatchObject({ status: response.status, code: expect.any(String) });
  } else {
    // What is told as it happens goes on until its listener leaves.
    await response.body?.cancel();
  }
}

describe.each(routePatterns().filter((pattern) => pattern.startsWith('/api/')))('%s', (pattern) => {
  const path = pathOf(pattern);

  test('wrong queries and bodies get a clear answer', async () => {
    for (const method of await methodsOf(pattern)) {
      for (const { who, call } of callers) {
        const isChange = method !== 'GET';
        // Changes that would succeed with no body end the very things the other callers knock with.
        if (isChange && (method === 'DELETE' || pattern.endsWith('/session'))) continue;
        for (const query of isChange ? [''] : QUERIES) {
          for (const [what, body, contentType] of isChange ? BODIES : BODIES.slice(0, 1)) {
            const headers: Record<string, string> = isChange ? { 'content-type': contentType } : {};
            const response = await callApi(method, `${path}${query}`, {
              ...call,
              headers,
              ...(isChange ? { body } : {}),
            });
            await expectClear(response, `${method} ${path}${query} by ${who} with ${what}`);
          }
        }
      }
    }
  });

  test('nobody is let in, and another network’s people find nothing', async () => {
    if (OPEN_ROUTES.includes(pattern)) return;
    for (const method of await methodsOf(pattern)) {
      const headers = { 'content-type': 'application/json' };
      const body = method === 'GET' ? undefined : '{}';
      const nobody = await callApi(method, path, { headers, body });
      expect(nobody.status, `${method} ${path} by nobody`).toBe(401);
      if (!pattern.includes('[network]')) continue;
      const foreign = await callApi(method, path, { ...callers[1]?.call, headers, body });
      expect(foreign.status, `${method} ${path} by a foreign operator`).toBe(404);
    }
  });
});

test('nothing of it changed who may do what', async () => {
  expect(await db()('users').where({ is_administrator: true })).toHaveLength(1);
  expect(({} as { isAdministrator?: boolean }).isAdministrator).toBeUndefined();
});
