import { TROUBLE_KINDS } from '#lib/contracts/health';
import {
  STATION_COLUMN_KEYS,
  STATION_COLUMNS,
  type HealthChoice,
  type StateChoice,
  type StationColumnKey,
  type StationListChoice,
} from '#lib/contracts/stationList';
import { STATION_STATES } from '#lib/contracts/stations';

export const STATE_CHOICES: readonly StateChoice[] = ['in-use', ...STATION_STATES, 'all'];
export const HEALTH_CHOICES: readonly HealthChoice[] = ['any', 'trouble', 'fine', ...TROUBLE_KINDS];

const FIRST_COLUMNS = STATION_COLUMN_KEYS.filter((key) => !STATION_COLUMNS[key].isOptional);

/** Reads what the address of the list asks for; words that mean nothing are as if left out. */
export function readStationList({ searchParams: query }: URL): StationListChoice {
  const sort = query.get('sort') ?? '';
  const wanted = query.getAll('column');
  const chosen = STATION_COLUMN_KEYS.filter((key) => key === 'station' || wanted.includes(key));
  return {
    text: (query.get('text') ?? '').trim().slice(0, 100),
    state: STATE_CHOICES.find((known) => known === query.get('state')) ?? 'in-use',
    health: HEALTH_CHOICES.find((known) => known === query.get('health')) ?? 'any',
    sort: {
      column: STATION_COLUMN_KEYS.find((key) => key === sort.replace(/^-/, '')) ?? 'station',
      isDescending: sort.startsWith('-'),
    },
    columns: wanted.length > 0 ? chosen : FIRST_COLUMNS,
  };
}

/** The query that asks for the same list in another way: `change` replaces parameters, null leaves one out. */
export function listHref(url: URL, change: Readonly<Record<string, string | null>>): string {
  const query = new URLSearchParams(url.searchParams);
  for (const [name, value] of Object.entries(change)) {
    if (value === null) query.delete(name);
    else query.set(name, value);
  }
  const text = query.toString().replaceAll('%3A', ':');
  return text ? `?${text}` : url.pathname;
}

/** What a column's heading asks for: to sort by it, or the other way round where the list is sorted by it. */
export function sortParameter(key: StationColumnKey, { sort }: StationListChoice): string {
  return sort.column === key && !sort.isDescending ? `-${key}` : key;
}
