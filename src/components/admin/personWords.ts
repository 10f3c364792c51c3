import { type PersonEntry, type RoleGiven } from '#lib/contracts/people';

export const ROLE_WORDS: Readonly<Record<RoleGiven['role'], { label: string; may: string }>> = {
  operator: { label: 'Operator', may: 'stations, limits, exclusions, exceedances, settings' },
  liaison: { label: 'Liaison', may: 'complaints, with the personal data, and replies' },
  regulator: { label: 'Regulator', may: 'reads everything but personal data; summaries' },
};

/** "administrator", "disabled" or both; empty where neither is so. */
export function stateWords({ isAdministrator, disabledAt }: PersonEntry): string {
  const words = [isAdministrator && 'administrator', disabledAt !== null && 'disabled'];
  return words.filter(Boolean).join(', ');
}

/** "merrow: operator, liaison; quarry: regulator". */
export function roleWords(roles: readonly RoleGiven[]): string {
  const networks = [...new Set(roles.map(({ network }) => network))];
  const rolesIn = (slug: string) => roles.filter(({ network }) => network === slug).map(({ role }) => role);
  return networks.map((slug) => `${slug}: ${rolesIn(slug).join(', ')}`).join('; ');
}

/** A role in a network as one value of a form, `merrow operator`; slugs have no spaces. */
export function roleValue({ network, role }: RoleGiven): string {
  return `${network} ${role}`;
}
