import { FAMILY_NAMES, type RouteFamily } from '#lib/contracts/accessTokens';

/** What the parts of a network are called that a token may be made for. */
export const FAMILY_WORDS: Readonly<Record<RouteFamily, string>> = {
  stations: 'stations, levels, health, weather',
  limits: 'limits, exceedances, alerts',
  complaints: 'complaints',
  summaries: 'summaries',
  upkeep: 'exclusions, imports, quarantine, instruments, calibrations',
  sources: 'plant, operations',
};

/** "reads everything", "changes complaints; summaries". */
export function scopeWords({
  access,
  families,
}: {
  access: 'read' | 'change';
  families: readonly string[] | null;
}): string {
  const verb = access === 'read' ? 'reads' : 'changes';
  if (families === null) return `${verb} everything`;
  const named = FAMILY_NAMES.filter((name) => families.includes(name));
  return `${verb} ${named.map((name) => FAMILY_WORDS[name]).join('; ')}`;
}
