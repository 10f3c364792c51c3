import { formatInstantUtc } from '#lib/contracts/common';

const MOST_DEPTH = 4;
/** Members that hold an instant as epoch seconds; durations of such names are shorter than any of these. */
const INSTANT_NAME = /(^|\.)(from|to)$|(At|Sec|From|To|Until)$/;
const FIRST_INSTANT_SEC = 1e9;

/**
 * What an act changed, a line each: `name: Quay → Quay Head` where there is a before and an after, `sessions: 2` else.
 * Members that stayed the same are left out. Instants are told in UTC.
 */
export function detailLines({ before, after, ...others }: Record<string, unknown>): string[] {
  // Null: there was none, which has no members.
  const [was, is] = [flat(before ?? undefined), flat(after ?? undefined)];
  const changed = [...new Set([...was.keys(), ...is.keys()])]
    .filter((path) => was.get(path) !== is.get(path))
    .map((path) => lineOf(path, was.get(path), is.get(path)));
  return [...changed, ...[...flat(others)].map(([path, value]) => `${path}: ${value}`)];
}

function lineOf(path: string, was: string | undefined, is: string | undefined): string {
  if (was === undefined) return `${path}: ${is}`;
  return `${path}: ${was} → ${is ?? 'nothing'}`;
}

/** The leaves of a value by their path. Lists are one leaf. */
function flat(value: unknown, path = '', depth = 0): Map<string, string> {
  if (value === undefined) return new Map();
  const isBranch = typeof value === 'object' && value !== null && !Array.isArray(value) && depth < MOST_DEPTH;
  if (!isBranch) return new Map([[path, isInstant(path, value) ? formatInstantUtc(value) : leafText(value)]]);
  const entries = Object.entries(value).flatMap(([name, member]) => [
    ...flat(member, path === '' ? name : `${path}.${name}`, depth + 1),
  ]);
  return new Map(entries);
}

function isInstant(path: string, value: unknown): value is number {
  return typeof value === 'number' && value >= FIRST_INSTANT_SEC && INSTANT_NAME.test(path);
}

function leafText(value: unknown): string {
  if (value === null) return 'none';
  if (Array.isArray(value)) return value.length === 0 ? 'none' : value.map(itemText).join('; ');
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  return typeof value === 'object' ? JSON.stringify(value) : String(value);
}

/** An item of a list; of an object its values: `merrow operator`. */
function itemText(item: unknown): string {
  if (typeof item !== 'object' || item === null) return String(item);
  return Object.values(item).map(leafText).join(' ');
}
