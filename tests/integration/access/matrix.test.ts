import { readFileSync } from 'node:fs';
import prettier from 'prettier';
import { beforeAll, expect, test } from 'vitest';
import { inTransaction } from '#db/queries/connection';
import { updateUser } from '#db/queries/users';
import { pagePatterns, takesForms } from '#ops/pictures/pagePatterns';
import { callApi, methodsOf, routePatterns } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { CALLERS, makeCaller, type CallerName } from '../support/roles';

/**
 * Measures who is let into which route and compares it with ops/accessMatrix.md, word by word: a new route, or another role, fails here until
 * the matrix says so. It is written anew by `npx vitest run … tests/integration/access/matrix.test.ts -u`, and read before it is committed.
 */
useFreshSchema();

const MATRIX = '../../../ops/accessMatrix.md';

const NAMES: Record<string, string> = {
  network: 'matrix',
  code: 'MX-1',
  id: '987654',
  deployment: '987654',
  reference: 'MATRIX-2026-0001',
  file: '2026-03.csv',
  month: '2026-03',
  key: 'ab'.repeat(32),
};

let ground: Parameters<typeof makeCaller>[1];

beforeAll(async () => {
  const home = await makeNetwork('matrix');
  const foreign = await makeNetwork('afar');
  ground = { home, foreign, stationId: await makeStation(home, 'MX-1') };
}, 240_000);

const pathOf = (pattern: string) =>
  pattern.replace(/\[(?:\.\.\.)?(\w+)\]/g, (_, name: string) => NAMES[name] ?? 'x');

/** What a caller hears who asks for nothing in particular; a body that is wrong, or a thing that is not there, comes after the door. */
async function heard(method: string, pattern: string, caller: CallerName): Promise<string> {
  const path = pathOf(pattern);
  const isChange = method !== 'GET';
  const answer = await callApi(method, path, {
    ...(await makeCaller(caller, ground)),
    headers: isChange ? { 'content-type': 'application/json' } : {},
    ...(isChange ? { body: '{}' } : {}),
  });
  const problem = answer.status >= 400 ? ((await answer.json()) as { detail?: string }) : {};
  await answer.body?.cancel().catch(() => undefined);
  if (answer.status === 401) return 'sign in';
  if (answer.status === 403) return 'no';
  const isHidden = answer.status === 404 && pattern.includes('[network]') && caller === CALLERS.at(-1);
  if (isHidden) {
    expect(problem.detail, `${method} ${pattern}`).not.toContain('matrix');
    return 'hidden';
  }
  return 'yes';
}

/** A page's own words of who may open it, the first of its frontmatter, and who may send its forms. */
function pageRow(pattern: string): string[] {
  const file = [`src/pages${pattern}.astro`, `src/pages${pattern}/index.astro`, `src/pages${pattern}.ts`]
    .map((name) => name.replace('//', '/'))
    .find((name) => readable(name) !== null);
  const source = file === undefined ? '' : (readable(file) ?? '');
  const guard = guardOf(source);
  const ofForms = /(?:pageNetwork\(Astro, isPost \?|enterNetwork\(user, network\.slug,) \[([^\]]*)\]/.exec(
    source,
  )?.[1];
  const forms = ofForms === undefined ? guard : rolesIn(ofForms);
  return [`\`${pattern}\``, guard, takesForms(pattern) ? forms : '–'];
}

function readable(file: string): string | null {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return null;
  }
}

function guardOf(source: string): string {
  if (/(pageAdministrator|requireAdministrator\w*)\(/.test(source)) return 'administrator';
  const network = /(?:pageNetwork|requireNetwork)\((?:Astro|context|[^)]*?)(?:, \[([^\]]*)\])?\)/.exec(
    source,
  );
  if (network) return network[1] === undefined ? 'every role of the network' : rolesIn(network[1]);
  if (/(pageUser|pageSession|pageHandedOver|requireSession\w*|requireUser)\(/.test(source))
    return 'signed in';
  return 'anybody';
}

function rolesIn(list: string): string {
  const roles = [...list.matchAll(/'(\w+)'/g)].map(([, role]) => role);
  return `${roles.join(', ')}, administrator`;
}

test('the matrix is as it is written down, and no route is missing', async () => {
  const rows: string[][] = [];
  for (const pattern of routePatterns()
    .filter((one) => one.startsWith('/api/'))
    .sort()) {
    for (const method of await methodsOf(pattern)) {
      const answers: string[] = [];
      for (const caller of CALLERS) answers.push(await heard(method, pattern, caller));
      rows.push([method, `\`${pattern.replace('/api/v1', '')}\``, ...answers]);
    }
  }
  expect(rows.length).toBeGreaterThan(190);
  // Whoever belongs to another network finds nothing of this one, whichever door is tried.
  for (const [method, pattern, ...answers] of rows) {
    if (pattern?.includes('[network]')) expect(answers.at(-1), `${method} ${pattern}`).toBe('hidden');
  }
  const text = `# Who may do what

Measured by \`tests/integration/access/matrix.test.ts\`, which fails where this differs and writes it anew with \`-u\`. Object by object (ids of another
network): \`tests/integration/access/objects.test.ts\`. Why it is so: decision 0082.

## The interface, below \`/api/v1\`

yes: let in (what is sent may still be wrong); no: 403; sign in: 401; hidden: 404, as a network that does not exist. Station: a station's token; of a mast's
token only \`POST /weather\` is opened. What is yes for everybody is public, or asks for a secret in what is sent.

${table(['', 'route', ...CALLERS], rows)}

## Pages

Read from each page's guard; that guards do as they say is looked at by \`tests/e2e/pages.test.ts\`, page by page and role by role. Someone of another network
gets 404, somebody who is not signed in the sign-in. Whoever may send the forms of a page that everybody may is named; routes behind it guard themselves.

${table(['page', 'may be opened by', 'its forms by'], pagePatterns().map(pageRow))}
`;
  await expect(await prettier.format(text, { parser: 'markdown', printWidth: 110 })).toMatchFileSnapshot(
    MATRIX,
  );
}, 600_000);

function table(head: readonly string[], rows: readonly string[][]): string {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`;
  return [line(head), line(head.map(() => '---')), ...rows.map(line)].join('\n');
}

test('a password that was handed over opens no door that asks who one is, but the one to change it', async () => {
  const { userId, session } = await makePerson(null, [], true);
  await inTransaction((transaction) => updateUser(userId, { mustChangePassword: true }, transaction));
  const codeOf = async (method: string, pattern: string, call: { session?: string }) => {
    const body = method === 'GET' ? {} : { body: '{}', headers: { 'content-type': 'application/json' } };
    const answer = await callApi(method, pathOf(pattern), { ...call, ...body });
    return answer.status < 400 ? answer.status : ((await answer.json()) as { code: string }).code;
  };
  const opened: string[] = [];
  let closedCount = 0;
  for (const pattern of routePatterns().filter((one) => one.startsWith('/api/'))) {
    for (const method of await methodsOf(pattern)) {
      if ((await codeOf(method, pattern, {})) !== 'sign-in-first') continue;
      if ((await codeOf(method, pattern, { session })) === 'password-first') closedCount += 1;
      else opened.push(`${method} ${pattern}`);
    }
  }
  expect(closedCount).toBeGreaterThan(150);
  expect(opened).toEqual(['POST /api/v1/me/password']);
}, 240_000);
