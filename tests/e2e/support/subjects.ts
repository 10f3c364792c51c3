import { setTimeout } from 'node:timers/promises';
import { inject } from 'vitest';
import { type Subjects } from '#ops/pictures/pagePatterns';
import { minutes, post } from './posts';
import { signedInFetch } from './signedInFetch';

const base = '/api/v1/networks/merrow';

/** One of each thing that pages are about, found in the demo or made through the interface. */
export async function someSubjects(): Promise<Subjects> {
  const api = await signedInFetch('operator@merrow.example');
  const read = async (path: string) => (await api('GET', `${base}/${path}`)).json() as Promise<unknown>;
  const firstOf = async (path: string, key: string) => {
    const { items } = (await read(path)) as { items: Record<string, unknown>[] };
    const value = items[0]?.[key];
    if (value === undefined) throw new Error(`There is nothing in ${path}.`);
    return String(value);
  };
  await quarantineOne(api);
  const made = await api('POST', `${base}/instruments`, {
    serialNumber: `T-${Date.now()}`,
    class: 1,
    description: 'For the tests of pages',
  });
  if (made.status !== 201) throw new Error(`The instrument was refused: ${await made.text()}`);
  const brought = await api(
    'POST',
    `${base}/imports?station=MER-07&name=empty.csv`,
    'start,seconds,LAeq\r\n2026-01-01T00:00:00Z,60,40.0\r\n',
    'text/csv',
  );
  if (brought.status !== 201) throw new Error(`The file was refused: ${await brought.text()}`);
  const stations = (await read('stations')) as { items: { code: string }[] };
  return {
    'limits/[id]': await firstOf('limits', 'id'),
    'exceedances/[id]': await firstOf('exceedances', 'id'),
    'quarantine/[id]': await firstOf('quarantine', 'id'),
    'imports/[id]': await firstOf('imports', 'id'),
    'plants/[id]': await plantOne(api),
    'activities/[id]': await activityOne(api),
    'instruments/[id]': await firstOf('instruments', 'id'),
    '[mast]': await firstOf('masts', 'code'),
    '[key]': await reportOne(),
    '[reference]': await firstOf('complaints', 'reference'),
    '[month]': await firstOf('summaries', 'month'),
    '[code]': stations.items[0]?.code ?? '',
  };
}

/** A resident's report by the public form; answers the key of its private page. */
async function reportOne(): Promise<string> {
  const address = `${inject('origin')}/report/merrow`;
  const page = await (await fetch(address)).text();
  const body = new FormData();
  const fields = {
    when: 'now',
    lasting: '30',
    kind: 'hum',
    area: 'elsewhere',
    address: 'Tern Row',
    consent: 'yes',
  };
  for (const [name, value] of Object.entries(fields)) body.set(name, value);
  body.set('stamp', /name="stamp" value="([^"]+)"/.exec(page)?.[1] ?? '');
  await setTimeout(4500);
  const answer = await fetch(address, { method: 'POST', body, redirect: 'manual' });
  const key = answer.headers.get('location')?.split('/').at(-1);
  if (!key) throw new Error(`The report was refused: ${answer.status}`);
  return key;
}

/** A record that receiving refuses and keeps. */
async function quarantineOne(api: Awaited<ReturnType<typeof signedInFetch>>): Promise<void> {
  const issued = await api('POST', `${base}/stations/MER-07/tokens`, { label: 'for the tests of pages' });
  const { token } = (await issued.json()) as { token: string };
  const answer = await post(token, minutes(Math.floor(Date.now() / 60_000 - 5) * 60, 1, 999));
  if (answer.status !== 200) throw new Error(`The post was refused: ${await answer.text()}`);
}

/** A plant of the site. */
async function plantOne(api: Awaited<ReturnType<typeof signedInFetch>>): Promise<string> {
  const body = { name: `Fan ${Date.now()}`, kind: 'fan', minRpm: 1480, blades: 8 };
  const answer = await api('POST', `${base}/plants`, body);
  if (answer.status !== 201) throw new Error(`The plant was refused: ${await answer.text()}`);
  return String(((await answer.json()) as { plant: { id: number } }).plant.id);
}

/** An entry of the operations log. */
async function activityOne(api: Awaited<ReturnType<typeof signedInFetch>>): Promise<string> {
  const body = { kind: 'shift', from: '2026-01-05T06:00:00Z', to: '2026-01-05T14:00:00Z' };
  const answer = await api('POST', `${base}/activities`, body);
  if (answer.status !== 201) throw new Error(`The entry was refused: ${await answer.text()}`);
  return String(((await answer.json()) as { activity: { id: number } }).activity.id);
}
