import { beforeAll, expect, inject, test } from 'vitest';
import { addressOf, pagePatterns, type Subjects } from '#ops/pictures/pagePatterns';
import { signedInFetch } from './support/signedInFetch';
import { someSubjects } from './support/subjects';

/** Said nowhere else: each stands for one thing that a person tells or is told. */
const CANARIES = {
  name: 'Quillmark Osprey',
  email: 'quillmark.osprey@residents.example',
  phone: '0555 918273',
  address: '77 Whinchat Loan',
  words: 'brazen kettledrum wallpaper',
  place: '54.11983',
  addition: 'velvet trombone midnight',
  note: 'porcelain hedgehog memo',
};
const EVERY = Object.values(CANARIES);
const found = (text: string) => EVERY.filter((canary) => text.includes(canary));

const COMPLAINTS = '/n/merrow/complaints';
let addresses: string[];
let references: string[];
let strangersNetwork: string;

beforeAll(async () => {
  const liaison = await signedInFetch('liaison@merrow.example');
  const { '[key]': key = '', ...subjects } = await someSubjects();
  const logged = await liaison('POST', '/api/v1/networks/merrow/complaints', {
    from: new Date(Date.now() - 7_200_000).toISOString(),
    to: new Date(Date.now() - 3_600_000).toISOString(),
    kind: 'whine',
    latitude: Number(CANARIES.place),
    longitude: 1.61234,
    words: CANARIES.words,
    contact: {
      name: CANARIES.name,
      email: CANARIES.email,
      phone: CANARIES.phone,
      address: CANARIES.address,
    },
  });
  const { complaint } = (await logged.json()) as { complaint: { reference: string } };
  references = [await addTo(key), complaint.reference];
  for (const reference of references) {
    const note = new URLSearchParams({ action: 'note', note: CANARIES.note }).toString();
    const form = 'application/x-www-form-urlencoded';
    const kept = await liaison('POST', `${COMPLAINTS}/${reference}`, note, form);
    if (!kept.ok) throw new Error(`The note was refused: ${kept.status}`);
  }
  // Whoever holds a private page's key is the resident: it is no subject of the walk.
  addresses = await everyAddress(subjects);
  await makeStranger();
}, 240_000);

/** Adds to a resident's report on its private page, and answers its reference. */
async function addTo(key: string): Promise<string> {
  const page = `${inject('origin')}/report/merrow/${key}`;
  const body = new FormData();
  body.set('act', 'add');
  body.set('addition', CANARIES.addition);
  const added = await fetch(page, { method: 'POST', body, redirect: 'manual' });
  if (added.status !== 303) throw new Error(`The addition was refused: ${added.status}`);
  const reference = /[A-Z]{3}-\d{4}-\d{4}/.exec(await (await fetch(page)).text())?.[0];
  if (!reference) throw new Error('The private page tells no reference.');
  return reference;
}

/** A liaison of another network, who must not be led to this one's complaints by any address. */
const STRANGER = { email: `stranger.${Date.now()}@afar.example`, password: 'a password of a stranger' };

async function makeStranger(): Promise<void> {
  const admin = await signedInFetch('admin@merrow.example');
  const slug = `afar-${Date.now()}`;
  const made = await admin('POST', '/api/v1/networks', { slug, name: 'Afar', timeZone: 'Europe/London' });
  if (made.status !== 201) throw new Error(`The network was refused: ${await made.text()}`);
  const roles = [{ network: slug, role: 'liaison' }];
  const added = await admin('POST', '/api/v1/people', { name: 'A stranger', ...STRANGER, roles });
  if (added.status !== 201) throw new Error(`The person was refused: ${await added.text()}`);
  strangersNetwork = slug;
}

/** Every page and every route that is read, with each complaint in the place of the reference. */
async function everyAddress(subjects: Subjects): Promise<string[]> {
  const described = await (await fetch(`${inject('origin')}/api/v1/openapi.json`)).json();
  const routes = Object.entries((described as { paths: Record<string, Record<string, unknown>> }).paths)
    .filter(([, methods]) => 'get' in methods)
    // What is told as it happens never ends.
    .filter(([path]) => !path.endsWith('/live'))
    .map(([path]) => path.replaceAll('{', '[').replaceAll('}', ']'));
  const patterns = [
    ...pagePatterns().filter((pattern) => !/^\/(sign-out|theme|500)/.test(pattern)),
    ...routes,
  ];
  const today = new Date(Date.now() + 86_400_000).toISOString().slice(0, 10);
  const monthAgo = new Date(Date.now() - 30 * 86_400_000).toISOString().slice(0, 10);
  const named = references.flatMap((reference) =>
    patterns.flatMap(
      (pattern) => addressOf(pattern, 'merrow', { ...subjects, '[reference]': reference }) ?? [],
    ),
  );
  const words = EVERY.map((canary) => `q=${encodeURIComponent(canary)}`);
  return [
    ...new Set(named),
    ...new Set(
      named
        .filter((address) => address.startsWith('/api/'))
        .map((address) => address + `?from=${monthAgo}T00:00:00Z&to=${today}T00:00:00Z`),
    ),
    `${COMPLAINTS}?status=all`,
    `/api/v1/networks/merrow/complaints.csv?status=all`,
    ...words.flatMap((query) => [`/n/merrow/search?${query}`, `/api/v1/networks/merrow/search?${query}`]),
    ...references.flatMap((reference) =>
      Array.from(
        { length: 12 },
        (_, id) => `/api/v1/networks/merrow/complaints/${reference}/replies/${id + 1}/letter`,
      ),
    ),
  ];
}

test('the liaison meets every one of them: the walk would see what is let out', async () => {
  const ask = await signedInFetch('liaison@merrow.example');
  const met = new Set<string>();
  for (const reference of references) {
    for (const path of [
      `${COMPLAINTS}/${reference}`,
      `/api/v1/networks/merrow/complaints/${reference}/person?format=text`,
    ]) {
      for (const canary of found(await (await ask('GET', path)).text())) met.add(canary);
    }
  }
  expect([...met].sort()).toEqual(EVERY.toSorted());
});

type Who = 'regulator' | 'operator' | 'a liaison of another network' | 'nobody';

async function callerOf(who: Who): Promise<(address: string) => Promise<Response>> {
  if (who === 'nobody') {
    return (address) => fetch(`${inject('origin')}${address}`, { redirect: 'manual' });
  }
  const ask =
    who === 'a liaison of another network'
      ? await signedInFetch(STRANGER.email, STRANGER.password)
      : await signedInFetch(`${who}@merrow.example`);
  return (address) => ask('GET', address);
}

test.each(['regulator', 'operator', 'a liaison of another network', 'nobody'] as const)(
  '%s meets none, on no page, in no answer of the interface, in no file',
  async (who) => {
    const ask = await callerOf(who);
    const leaks: string[] = [];
    const broken: string[] = [];
    let open = 0;
    const isStranger = who === 'a liaison of another network';
    const asIfTheirs = addresses.map((address) => address.replace('/merrow', `/${strangersNetwork}`));
    for (const address of isStranger ? [...addresses, ...asIfTheirs] : addresses) {
      const answer = await ask(address);
      const told =
        [...answer.headers].flat().join('\n') + Buffer.from(await answer.arrayBuffer()).toString('utf8');
      // A person's own search is said back to whoever searched.
      const leaked = found(told).filter((canary) => !address.includes(encodeURIComponent(canary)));
      if (leaked.length > 0) leaks.push(`${address}: ${leaked.join(', ')}`);
      if (answer.status >= 500) broken.push(`${address}: ${answer.status}`);
      if (answer.status === 200) open += 1;
    }
    expect(leaks).toEqual([]);
    expect(broken).toEqual([]);
    // The walk gets somewhere: nobody to a few public pages, members of the network to nearly all.
    expect(open).toBeGreaterThan(who === 'nobody' ? 2 : isStranger ? 20 : 60);
  },
  900_000,
);

test('mail says nothing of the person but to the person', async () => {
  const mails = (await (await fetch(`${inject('mailOrigin')}/api/messages`)).json()) as {
    to: string;
    subject: string;
  }[];
  for (const { subject } of mails) expect(found(subject)).toEqual([]);
  const toOthers = mails.filter(({ to }) => !to.includes(CANARIES.email));
  expect(found(JSON.stringify(toOthers))).toEqual([]);
});
