import { setTimeout as sleep } from 'node:timers/promises';
import { beforeAll, expect, inject, test } from 'vitest';
import { addressOf, pagePatterns } from '#ops/pictures/pagePatterns';
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
  contact: 'Thornapple Dunlin',
};
const EVERY = Object.values(CANARIES);
const found = (text: string) => EVERY.filter((canary) => text.includes(canary));

const COMPLAINTS = '/n/merrow/complaints';
let addresses: string[];
let references: string[];

beforeAll(async () => {
  const liaison = await signedInFetch('liaison@merrow.example');
  const reported = await report();
  const logged = await liaison('POST', '/api/v1/networks/merrow/complaints', {
    from: new Date(Date.now() - 7_200_000).toISOString(),
    to: new Date(Date.now() - 3_600_000).toISOString(),
    kind: 'whine',
    station: 'MER-02',
    words: CANARIES.words,
    contact: {
      name: CANARIES.contact,
      email: CANARIES.email,
      phone: CANARIES.phone,
      address: CANARIES.address,
    },
  });
  const { complaint } = (await logged.json()) as { complaint: { reference: string } };
  references = [reported, complaint.reference];
  const form = 'application/x-www-form-urlencoded';
  for (const reference of references) {
    const note = new URLSearchParams({ action: 'note', note: CANARIES.note }).toString();
    const kept = await liaison('POST', `${COMPLAINTS}/${reference}`, note, form);
    if (!kept.ok) throw new Error(`The note was refused: ${kept.status}`);
  }
  addresses = await everyAddress();
}, 240_000);

/** Reports on the public form with everything that it takes, adds to it, and answers the reference. */
async function report(): Promise<string> {
  const address = `${inject('origin')}/report/merrow`;
  const page = await (await fetch(address)).text();
  const body = new FormData();
  const fields = {
    when: 'now',
    lasting: '30',
    kind: 'hum',
    area: 'elsewhere',
    place: `${CANARIES.place}, 1.61234`,
    words: CANARIES.words,
    name: CANARIES.name,
    email: CANARIES.email,
    phone: CANARIES.phone,
    address: CANARIES.address,
    consent: 'yes',
    stamp: /name="stamp" value="([^"]+)"/.exec(page)?.[1] ?? '',
  };
  for (const [name, value] of Object.entries(fields)) body.set(name, value);
  await sleep(4500);
  const answer = await fetch(address, { method: 'POST', body, redirect: 'manual' });
  const path = answer.headers.get('location');
  if (!path) throw new Error(`The report was refused: ${answer.status}`);
  const addition = new FormData();
  addition.set('act', 'add');
  addition.set('addition', CANARIES.addition);
  await fetch(`${inject('origin')}${path}`, { method: 'POST', body: addition, redirect: 'manual' });
  const own = await (await fetch(`${inject('origin')}${path}`)).text();
  const reference = /[A-Z]{3}-\d{4}-\d{4}/.exec(own)?.[0];
  if (!reference) throw new Error('The private page tells no reference.');
  return reference;
}

/** Every page and every route that is read, with each complaint in the place of the reference. */
async function everyAddress(): Promise<string[]> {
  const described = await (await fetch(`${inject('origin')}/api/v1/openapi.json`)).json();
  const routes = Object.entries((described as { paths: Record<string, Record<string, unknown>> }).paths)
    .filter(([, methods]) => 'get' in methods)
    // What is told as it happens never ends.
    .filter(([path]) => !path.endsWith('/live'))
    .map(([path]) => path.replaceAll('{', '[').replaceAll('}', ']'));
  // Whoever holds a private page's key is the resident.
  const subjects = Object.fromEntries(
    Object.entries(await someSubjects()).filter(([parameter]) => parameter !== '[key]'),
  );
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

test.each([['regulator'], ['operator'], [null]])(
  '%s meets none, on no page, in no answer of the interface, in no file',
  async (who) => {
    const ask = who === null ? null : await signedInFetch(`${who}@merrow.example`);
    const leaks: string[] = [];
    const broken: string[] = [];
    let open = 0;
    for (const address of addresses) {
      const answer = ask
        ? await ask('GET', address)
        : await fetch(`${inject('origin')}${address}`, { redirect: 'manual' });
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
    // Nobody is let in but to a few public pages.
    expect(open).toBeGreaterThan(who === null ? 2 : 60);
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
