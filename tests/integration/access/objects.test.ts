import fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import { callApi, methodsOf, routePatterns } from '../support/callApi';
import { describedRoutes, type Described } from '../support/described';
import { valid, type Components } from '../support/fromSchema';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { PLANTED, PLANTED_ID, plantEverything } from '../support/plant';

/**
 * Every address that names a thing is asked for one of another network, and for one that does not exist: the answers must be the same, word by
 * word, so that nobody can tell which ids are taken elsewhere.
 */
useFreshSchema();

const MARK = 'qZforeign7';
const BODIES = 6;

/** What stands for a thing of another network, and for one that nobody has. */
const THINGS: Record<string, { theirs: string; none: string }> = {
  id: { theirs: String(PLANTED_ID), none: '987654' },
  deployment: { theirs: String(PLANTED_ID), none: '987654' },
  reference: { theirs: PLANTED.reference, none: 'PLANT-2026-9999' },
  code: { theirs: PLANTED.code, none: 'PL-NONE' },
};

/** Bodies of our own where what the description lets through is refused before anything is looked for. */
const HAND_MADE: Record<string, unknown> = {
  'imports/[id]/mapping': { delimiter: ',', decimal: '.', columns: ['start', 'seconds', 'LAeq'] },
  'instruments/[id]/deployments': { station: 'HM-1', from: '2026-02-01T00:00:00Z' },
  'instruments/[id]/deployments/[deployment]/end': { to: '2026-02-11T00:00:00Z' },
  'limits/[id]/versions': {
    name: 'Night',
    metric: 'LAeq',
    threshold: 45,
    window: '1h',
    reason: 'as agreed',
    stations: ['HM-1'],
  },
  'mast-assignments/[id]/end': { to: '2026-02-11T00:00:00Z' },
  'masts/[code]/assignments': { station: 'HM-1', from: '2026-02-01T00:00:00Z' },
  'plants/[id]/versions': { name: 'Fan', kind: 'fan', reason: 'as built' },
  'station-groups/[id]': { name: 'Yard', stations: ['HM-1'] },
};

let sessions: string[];
let routes: Map<string, Described>;
let components: Components;

beforeAll(async () => {
  const home = await makeNetwork('home');
  const foreign = await makeNetwork('afar');
  await makeStation(home, 'HM-1');
  const { userId } = await makePerson(foreign, ['operator']);
  const stationId = await makeStation(foreign, PLANTED.code);
  expect((await plantEverything({ networkId: foreign, stationId, userId }, MARK)).length).toBeGreaterThan(60);
  sessions = [
    (await makePerson(home, ['operator', 'liaison', 'regulator'])).session,
    (await makePerson(null, [], true)).session,
  ];
  const described = await describedRoutes();
  routes = new Map(described.routes.map((one) => [`${one.method} ${one.pattern}`, one]));
  components = described.components;
}, 240_000);

const patterns = routePatterns().filter((pattern) =>
  /^\/api\/v1\/networks\/\[network\]\/.*\[(id|deployment|reference|code)\]/.test(pattern),
);

function addressOf(pattern: string, which: 'theirs' | 'none'): string {
  return pattern
    .replace('[network]', 'home')
    .replace(/\[month\]/, PLANTED.month)
    .replace(/\[(\w+)\]/g, (_, name: string) => THINGS[name]?.[which] ?? 'x');
}

/** An answer without what of the address it repeats. */
async function told(response: Response): Promise<string> {
  const text = await response.text();
  const names = Object.values(THINGS).flatMap(({ theirs, none }) => [theirs, none]);
  return `${response.status} ${names.reduce((rest, name) => rest.replaceAll(name, '…'), text)}`;
}

function bodiesOf({ pattern, body }: Described): unknown[] {
  if (!body) return [undefined];
  const ownBody = HAND_MADE[pattern.replace('/api/v1/networks/[network]/', '')];
  const generated = fc.sample(valid(body, components), { seed: 11, numRuns: BODIES });
  return ownBody === undefined ? generated : [...generated, ownBody];
}

function headersOf({ bodyType, pattern }: Described): Record<string, string> {
  const part: Record<string, string> = pattern.endsWith('/uploads/[id]/content')
    ? { 'content-range': 'bytes 0-0/1' }
    : {};
  return bodyType ? { 'content-type': bodyType, ...part } : {};
}

function queryOf({ parameters }: Described): string {
  const query = parameters.filter((parameter) => parameter.in === 'query' && parameter.required);
  const values = query.map(({ name }) => [
    name,
    name === 'to' ? '2026-02-11T00:00:00Z' : '2026-02-10T00:00:00Z',
  ]);
  return values.length > 0 ? `?${new URLSearchParams(values).toString()}` : '';
}

test('every kind of address that names a thing is looked at', () => {
  expect(patterns.length).toBeGreaterThan(40);
});

describe.each(patterns)('%s', (pattern) => {
  test('a thing of another network is as one that does not exist', async () => {
    for (const method of await methodsOf(pattern)) {
      const route = routes.get(`${method} ${pattern}`);
      if (!route) throw new Error(`The interface's description lacks ${method} ${pattern}.`);
      const bodies = bodiesOf(route);
      let notFound = 0;
      for (const session of sessions) {
        for (const body of bodies) {
          const call = {
            session,
            headers: headersOf(route),
            body: route.body ? JSON.stringify(body) : route.bodyType ? '-' : undefined,
          };
          const ask = (which: 'theirs' | 'none') =>
            callApi(method, addressOf(pattern, which) + queryOf(route), call);
          const [theirs, none] = [await ask('theirs'), await ask('none')];
          if (none.status === 404) notFound += 1;
          const heard = await told(theirs);
          expect(heard, `${method} ${pattern}`).toBe(await told(none));
          expect(heard, `${method} ${pattern}`).not.toContain(MARK);
          expect(theirs.status, `${method} ${pattern}`).toBeGreaterThanOrEqual(400);
        }
      }
      // Else only the body was judged, and nothing was looked for.
      expect(notFound, `${method} ${pattern}: ${JSON.stringify(bodies[0])}`).toBeGreaterThan(0);
    }
  }, 120_000);
});

test('nor can somebody else’s session or access token be ended', async () => {
  for (const pattern of ['/api/v1/me/tokens/', '/api/v1/me/sessions/']) {
    const ask = (id: string) => callApi('DELETE', pattern + id, { session: sessions[0] });
    const [theirs, none] = [await ask(String(PLANTED_ID)), await ask('987654')];
    expect(theirs.status).toBe(404);
    expect(await told(theirs)).toBe(await told(none));
  }
});
