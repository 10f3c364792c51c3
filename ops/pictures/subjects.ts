import { type Subjects } from './pagePatterns';
import { type Session } from './session';

/** Lists that name the subject of a page, by the parameter that stands for it, and which of their fields names it. */
const LISTS: [parameter: string, path: string, key: string][] = [
  ['limits/[id]', 'limits', 'id'],
  ['exceedances/[id]', 'exceedances', 'id'],
  ['quarantine/[id]', 'quarantine', 'id'],
  ['imports/[id]', 'imports', 'id'],
  ['plants/[id]', 'plants', 'id'],
  ['activities/[id]', 'activities', 'id'],
  ['instruments/[id]', 'instruments', 'id'],
  ['[mast]', 'masts', 'code'],
  ['[reference]', 'complaints', 'reference'],
  ['[month]', 'summaries', 'month'],
  ['[code]', 'stations', 'code'],
];

/** The first of each thing of a network that pages are about, only read; what it has none of is left out. */
export async function subjectsOf(network: string, session: Session): Promise<Subjects> {
  const subjects: Subjects = {};
  for (const [parameter, path, key] of LISTS) {
    const answer = await session.ask(`/api/v1/networks/${network}/${path}`);
    if (!answer.ok) throw new Error(`${path} of ${network} answered ${answer.status}.`);
    const { items } = (await answer.json()) as { items: Record<string, unknown>[] };
    const value = items[0]?.[key];
    if (value !== undefined) subjects[parameter] = String(value);
  }
  return subjects;
}
