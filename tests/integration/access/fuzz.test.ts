import fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import { db } from '#db/client';
import { hashPassword } from '#lib/auth/passwords';
import { callApi, methodsOf, routePatterns } from '../support/callApi';
import { describedRoutes, type Described } from '../support/described';
import { HOSTILE, sent, type Components } from '../support/fromSchema';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { PLANTED, PLANTED_ID, plantEverything } from '../support/plant';
import { CALLERS, makeCaller, type CallerName, type Credentials } from '../support/roles';

/**
 * Random requests, right and wrong, as the interface's description has them, to every route as everybody: never a 5xx, never a hang, never
 * anything of another network. `FUZZ_RUNS` requests a route and caller (2 unless set), `FUZZ_SEED` to repeat a run.
 */
useFreshSchema();

const RUNS = Number(process.env['FUZZ_RUNS'] ?? 2);
const SEED = Number(process.env['FUZZ_SEED'] ?? 20_260_301);
const LONGEST_MS = 20_000;

/** Stands in every text of the other network, and nowhere else. */
const MARK = 'qZcanary7';

/** The administrator may read of every network; of another one there is nothing that its operator may not. */
const WHO = CALLERS.filter((name) => name !== 'operator of another network');

const routesOf = routePatterns().filter((pattern) => pattern.startsWith('/api/'));

let ground: Parameters<typeof makeCaller>[1];
let routes: Map<string, Described>;
let components: Components;
let passwordHash: string;

beforeAll(async () => {
  const home = await makeNetwork('fuzzed');
  const stationId = await makeStation(home, 'FZ-1');
  await furnish((await makePerson(home, ['operator', 'liaison'])).session);
  const foreign = await makeNetwork(MARK.toLowerCase());
  const { userId } = await makePerson(foreign, ['operator']);
  const foreignStation = await makeStation(foreign, PLANTED.code, { name: MARK, surroundings: MARK });
  await plantEverything({ networkId: foreign, stationId: foreignStation, userId }, MARK);
  ground = { home, foreign, stationId };
  passwordHash = await hashPassword('a password of somebody');
  const described = await describedRoutes();
  expect(described.forgotten).toEqual(['GET /api/v1/openapi.json']);
  routes = new Map(described.routes.map((one) => [`${one.method} ${one.pattern}`, one]));
  components = described.components;
}, 240_000);

/** Things of the home network, so that there is something to change; their ids are 1, because they are the first. */
async function furnish(session: string): Promise<void> {
  const things: [path: string, body: Record<string, unknown>][] = [
    [
      'activities',
      { kind: 'blasting', place: 'quarry', from: '2026-02-10T09:00:00Z', to: '2026-02-10T10:00:00Z' },
    ],
    [
      'exclusions',
      { station: 'FZ-1', from: '2026-02-10T09:00:00Z', to: '2026-02-10T10:00:00Z', reason: 'roadworks' },
    ],
    ['instruments', { serialNumber: 'SN-1', class: 1, description: 'a meter', microphone: 'a microphone' }],
    ['instruments/1/deployments', { station: 'FZ-1', from: '2026-02-01T00:00:00Z' }],
    [
      'limits',
      { name: 'Night', metric: 'LAeq', threshold: 45, window: '1h', reason: 'as agreed', stations: ['FZ-1'] },
    ],
    ['masts', { code: 'MA-1', name: 'A mast', latitude: 54.1, longitude: 1.6, height: 10 }],
    ['plants', { name: 'Fan', kind: 'fan', reason: 'as built' }],
    ['station-groups', { name: 'Yard', stations: ['FZ-1'] }],
    ['webhooks', { url: 'https://alerts.quay.example/noise' }],
    [
      'complaints',
      {
        from: '2026-02-10T09:00:00Z',
        to: '2026-02-10T10:00:00Z',
        kind: 'whine',
        station: 'FZ-1',
        words: 'a whine',
      },
    ],
  ];
  for (const [path, body] of things) {
    const answer = await callApi('POST', `/api/v1/networks/fuzzed/${path}`, { session, body });
    if (answer.status !== 201) throw new Error(`${path}: ${answer.status} ${await answer.text()}`);
  }
}

/** Names in addresses: of the home network, of the other one, of nobody, and what no name looks like. */
const IN_PATHS: Record<string, fc.Arbitrary<string>> = {
  code: fc.constantFrom('FZ-1', 'FZ-1', 'MA-1', PLANTED.code, 'NO-1'),
  month: fc.constantFrom(PLANTED.month, '2026-01', '2026-13', '0000-00'),
  file: fc.constantFrom('2026-01.csv', `${PLANTED.month}.pdf`, '2026-01.exe'),
  reference: fc.constantFrom(PLANTED.reference, 'FUZ-2026-0001'),
};
const ID = fc.constantFrom('1', '1', '2', String(PLANTED_ID), '0', '-1', '99999999999999999999', '1.5', 'x');

/** To whom everything is open the planted rows would be open, too, and they make no sense. */
function networksFor(who: CallerName): fc.Arbitrary<string> {
  const others = who === 'administrator' ? ['nowhere'] : [MARK.toLowerCase(), 'nowhere'];
  return fc.oneof(
    { weight: 8, arbitrary: fc.constant('fuzzed') },
    { weight: 1, arbitrary: fc.constantFrom(...others) },
  );
}

function pathOf(pattern: string, who: CallerName): fc.Arbitrary<string> {
  const names = [...pattern.matchAll(/\[(?:\.\.\.)?(\w+)\]/g)].map(([, name = '']) => name);
  const hostile = fc.constantFrom(...HOSTILE.filter((text) => text !== '' && !/\p{Surrogate}/u.test(text)));
  const values = names.map((name) => {
    if (name === 'network') return networksFor(who);
    return fc.oneof({ weight: 9, arbitrary: IN_PATHS[name] ?? ID }, { weight: 1, arbitrary: hostile });
  });
  return fc.tuple(...values).map((chosen) => {
    let at = 0;
    return pattern.replace(/\[(?:\.\.\.)?\w+\]/g, () => encodeURIComponent(chosen[at++] ?? 'x'));
  });
}

function queryOf({ parameters }: Described): fc.Arbitrary<string> {
  const values = parameters
    .filter((parameter) => parameter.in === 'query')
    .map((parameter) => {
      const value = sent(parameter.schema, components).map((one) => {
        const text = typeof one === 'string' ? one : (JSON.stringify(one) ?? '');
        return [[parameter.name, text]];
      });
      return fc.oneof(
        { weight: parameter.required ? 8 : 2, arbitrary: value },
        { arbitrary: fc.constant([]), weight: 1 },
      );
    });
  return fc
    .tuple(...values)
    .map((pairs) => new URLSearchParams(pairs.flat() as [string, string][]).toString());
}

function bodyOf({ body, bodyType }: Described): fc.Arbitrary<string | undefined> {
  if (body) return sent(body, components).map((value) => JSON.stringify(value) ?? 'null');
  return bodyType ? fc.string({ maxLength: 200 }) : fc.constant(undefined);
}

function headersOf({ bodyType }: Described): Record<string, string> {
  return bodyType ? { 'content-type': bodyType } : {};
}

/** What came, as text; of what goes on for ever its beginning. */
async function textOf(response: Response): Promise<string> {
  if (!response.headers.get('content-type')?.startsWith('text/event-stream')) {
    return Buffer.from(await response.arrayBuffer()).toString('latin1');
  }
  const reader = response.body?.getReader();
  const first = await reader?.read();
  await reader?.cancel();
  return Buffer.from((first?.value as Uint8Array | undefined) ?? []).toString('latin1');
}

function within<T>(work: Promise<T>, told: string): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, fail) => {
    timer = setTimeout(() => fail(new Error(`No answer within ${LONGEST_MS} ms: ${told}`)), LONGEST_MS);
  });
  return Promise.race([work, late]).finally(() => clearTimeout(timer));
}

async function knock(route: Described, who: CallerName, credentials: Credentials): Promise<void> {
  const requests = fc.record({
    path: pathOf(route.pattern, who),
    query: queryOf(route),
    body: bodyOf(route),
  });
  await fc.assert(
    fc.asyncProperty(requests, async ({ path, query, body }) => {
      const address = query === '' ? path : `${path}?${query}`;
      const told = `${route.method} ${address} by ${who} with ${body?.slice(0, 400)}`;
      const call = {
        ...credentials,
        body,
        headers: headersOf(route),
      };
      const response = await within(callApi(route.method, address, call), told);
      const text = await within(textOf(response), told);
      expect(response.status, `${told}: ${text.slice(0, 300)}`).toBeLessThan(500);
      if (response.status >= 400)
        expect(response.headers.get('content-type'), told).toBe('application/problem+json');
      // What was sent may come back; what was not sent must be nobody's.
      const isAsked = `${address}${body}`.toLowerCase().includes(MARK.toLowerCase());
      if (who !== 'administrator' && !isAsked) expect(text.includes(MARK), told).toBe(false);
    }),
    { seed: SEED, numRuns: RUNS, endOnFailure: true },
  );
}

describe.each(routesOf)('%s', (pattern) => {
  test(
    'whatever is sent, by whomever',
    async () => {
      for (const method of await methodsOf(pattern)) {
        const route = routes.get(`${method} ${pattern}`);
        if (!route) continue;
        for (const who of WHO) {
          const credentials = await makeCaller(who, ground);
          await db()('users').where({ password_hash: '-' }).update({ password_hash: passwordHash });
          await knock(route, who, credentials);
        }
      }
    },
    60_000 + RUNS * 60_000,
  );
});

test('nothing of it reached into every object', () => {
  expect(Object.keys(Object.prototype)).toEqual([]);
  expect(({} as { isAdministrator?: unknown }).isAdministrator).toBeUndefined();
});
