import type { Role } from '#db/queries/users';

export type { Role };

export const ALL_ROLES: readonly Role[] = ['operator', 'liaison', 'regulator'];

/**
 * Whether a person with `held` roles in a network may do what `wanted` roles may. The administrator may do whatever an
 * operator may; personal data is asked for with `wanted` = liaison, which the administrator is let into as well.
 */
export function mayAct(
  person: { isAdministrator: boolean },
  held: readonly Role[],
  wanted: readonly Role[],
): boolean {
  return person.isAdministrator || held.some((role) => wanted.includes(role));
}
