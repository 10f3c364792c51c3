import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { launchChromium } from '#ops/chromium';
import { albumPage, type Leaf } from './album';
import { addressOf, pagePatterns } from './pagePatterns';
import { takePicture, VIEWS } from './picture';
import { LOOKERS, Session, type Looker } from './session';
import { subjectsOf } from './subjects';

/**
 * Pictures of every page of a running Bittern with its demo, in both themes, wide and narrow, as files and one page that shows
 * them; nothing is changed there. `npx tsx ops/pictures/take.ts [--role operator] [--only map] [--network merrow]`; without a role each page is
 * seen by the first of nobody, operator, liaison, regulator and administrator who may. Settings: BITTERN_ORIGIN,
 * BITTERN_DEMO_PASSWORD; they go to BITTERN_DATA_DIR/pictures.
 */
const { values: options } = parseArgs({
  options: {
    role: { type: 'string' },
    only: { type: 'string' },
    network: { type: 'string', default: 'merrow' },
  },
});
const origin = process.env['BITTERN_ORIGIN'] ?? 'http://127.0.0.1:4321';
const folder = join(process.env['BITTERN_DATA_DIR'] ?? '.bittern', 'pictures');
mkdirSync(folder, { recursive: true });

const sessions = await startSessions();
const reader = sessions.find(({ looker }) => looker !== 'nobody') ?? (await signIn('operator'));
const subjects = await subjectsOf(options.network, reader);
const patterns = pagePatterns().filter((pattern) => !options.only || pattern.includes(options.only));
const leaves: Leaf[] = [];
const missing: string[] = [];
const browser = await launchChromium();
try {
  for (const pattern of patterns) {
    const path = addressOf(pattern, options.network, subjects);
    const session = path === null ? undefined : await firstShown(path);
    if (path === null || !session) {
      missing.push(`${pattern}: ${path === null ? 'there is nothing to show' : 'no page for these people'}`);
      continue;
    }
    const leaf: Leaf = { pattern, path, looker: session.looker, pictures: [] };
    for (const view of VIEWS) leaf.pictures.push(await takePicture(browser, session, path, view, folder));
    leaves.push(leaf);
    tell(leaf);
  }
} finally {
  await browser.close();
}
writeFileSync(join(folder, 'index.html'), albumPage({ takenAt: new Date(), leaves, missing }));
for (const words of missing) console.log(`without a picture: ${words}`);
console.log(`${leaves.length} pages, see ${join(folder, 'index.html')}`);

function startSessions(): Promise<Session[]> {
  if (!options.role) return Promise.all(LOOKERS.map(signIn));
  const looker = LOOKERS.find((one) => one === options.role);
  if (!looker) throw new Error(`--role must be one of ${LOOKERS.join(', ')}.`);
  return Promise.all([signIn(looker)]);
}

function signIn(looker: Looker): Promise<Session> {
  const password = process.env['BITTERN_DEMO_PASSWORD'];
  if (!password) throw new Error('Set BITTERN_DEMO_PASSWORD to the password that the start printed.');
  return Session.start(looker, origin, password);
}

async function firstShown(path: string): Promise<Session | undefined> {
  for (const session of sessions) if (await session.isShown(path)) return session;
  return undefined;
}

function tell({ path, pictures }: Leaf): void {
  const faults = pictures.flatMap(({ theme, widthPx, faults }) =>
    faults.map((fault) => `  ${theme}, ${widthPx} px: ${fault}`),
  );
  console.log([path, ...new Set(faults)].join('\n'));
}
