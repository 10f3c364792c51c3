import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type FigureChange } from '#lib/contracts/summaryLife';

type Leaf = number | string | boolean | null;
type Plain = Leaf | Plain[] | { [key: string]: Plain };

/** What two computations of the same figure may differ by, dB or share: the order of adding up. */
const TOLERANCE = 1e-6;
const MOST_CHARACTERS = 80;

/** Parts that say when or for whom a month was computed, or how complaints stand by now: no figures of the month. */
const NO_FIGURES = new Set(['form', 'generatedAt', 'isToDate', 'complaints', 'network']);

/** Parts of a station that are null in months issued before they were told: that they are there now is no change. */
const TOLD_LATER = ['yearToDate U'];

export type BareChange = Omit<FigureChange, 'why'>;

/** Every figure that differs between two computations of a month, in the document’s order; those of the network first. */
export function changedFigures(old: MonthDocument, now: MonthDocument): BareChange[] {
  const { stations: oldStations, ...oldWhole } = old;
  const { stations: newStations, ...newWhole } = now;
  const codes = [...new Set([...oldStations, ...newStations].map(({ code }) => code))].sort();
  const byCode = (stations: MonthDocument['stations'], code: string) =>
    stations.find((station) => station.code === code);
  return [
    ...changesBetween(null, leavesOf(without(oldWhole)), leavesOf(without(newWhole))),
    ...codes.flatMap((code) => {
      const before = leavesOf(byCode(oldStations, code));
      return changesBetween(code, before, asTold(leavesOf(byCode(newStations, code)), before));
    }),
  ];
}

/** Without the parts that a month was issued before anybody was told of. */
function asTold(now: Map<string, Leaf>, old: ReadonlyMap<string, Leaf>): Map<string, Leaf> {
  const untold = TOLD_LATER.filter((part) => old.get(part) === null);
  if (untold.length === 0) return now;
  return new Map([...now].filter(([figure]) => !untold.some((part) => figure.startsWith(`${part} `))));
}

function without(whole: Record<string, unknown>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(whole).filter(([name]) => !NO_FIGURES.has(name)));
}

function changesBetween(
  station: string | null,
  old: ReadonlyMap<string, Leaf>,
  now: ReadonlyMap<string, Leaf>,
): BareChange[] {
  return [...new Set([...old.keys(), ...now.keys()])].flatMap((figure) => {
    const [before = null, after = null] = [old.get(figure), now.get(figure)];
    return isSame(before, after) ? [] : [{ station, figure, old: short(before), new: short(after) }];
  });
}

function isSame(a: Leaf, b: Leaf): boolean {
  if (typeof a === 'number' && typeof b === 'number') return Math.abs(a - b) <= TOLERANCE;
  return a === b;
}

/** The picture of a month is told to differ, not spelled out. */
function short(value: Leaf): Leaf {
  return typeof value === 'string' && value.length > MOST_CHARACTERS
    ? `${value.slice(0, MOST_CHARACTERS - 1)}…`
    : value;
}

function leavesOf(value: unknown): Map<string, Leaf> {
  const leaves = new Map<string, Leaf>();
  if (value !== undefined) collect(value as Plain, '', leaves);
  return leaves;
}

function collect(value: Plain, path: string, leaves: Map<string, Leaf>): void {
  if (Array.isArray(value)) {
    const seen = new Map<string, number>();
    for (const [at, item] of value.entries()) {
      const name = nameOf(item) ?? String(at + 1);
      const times = (seen.get(name) ?? 0) + 1;
      seen.set(name, times);
      collect(item, joined(path, times === 1 ? name : `${name} (${times})`), leaves);
    }
  } else if (value !== null && typeof value === 'object') {
    for (const [key, part] of Object.entries(value)) collect(part, joined(path, key), leaves);
  } else {
    leaves.set(path, value);
  }
}

const joined = (path: string, name: string) => (path === '' ? name : `${path} ${name}`);

/** What an item of a list is told apart by, so that one that comes in between does not shift the others. */
function nameOf(item: Plain): string | null {
  if (item === null || typeof item !== 'object' || Array.isArray(item)) return null;
  const has = (key: string) => item[key] !== undefined && item[key] !== null;
  if (has('hour'))
    return `${text(item['date'])} ${text(item['hour'])}:00${item['turn'] === 1 ? ' again' : ''}`;
  if (has('date')) return text(item['date']);
  if (has('nominalHz')) return `${text(item['nominalHz'])} Hz`;
  if (has('limitVersion') && !has('id'))
    return `limit ${text(item['limitId'])} version ${text(item['limitVersion'])}`;
  if (has('id')) return `${text(item['id'])}${has('version') ? ` version ${text(item['version'])}` : ''}`;
  if (has('quantity')) return text(item['quantity']);
  if (has('checkedAt')) return `${text(item['serialNumber'])} ${text(item['checkedAt'])}`;
  if (has('seconds') && has('reason')) return text(item['reason']);
  if (has('from')) return text(item['from']);
  return null;
}

const text = (value: Plain | undefined) => String(value as Leaf | undefined);
