import { roleValue } from '#components/admin/personWords.ts';
import { inviteByAdministrator, sendAgain, takeBack } from '#lib/auth/invitationActs';
import {
  addByAdministrator,
  changeByAdministrator,
  resetByAdministrator,
  resetFactor,
  rolesGiven,
  setDisabled,
} from '#lib/auth/personActs';
import { newInvitationSchema } from '#lib/contracts/invitations';
import {
  newPersonSchema,
  passwordResetSchema,
  personChangesSchema,
  type RoleGiven,
} from '#lib/contracts/people';
import { typedExactly, type FormValues } from '#lib/http/forms';
import { badRequest } from '#lib/http/problem';

type Person = Parameters<typeof rolesGiven>[0];

export const PERSON_DONE = {
  added: 'The person is added and may sign in.',
  changed: 'Saved. It holds from the next request on.',
  reset: 'The new password holds. Every session has ended.',
  disabled: 'The account is disabled. Sessions and tokens have ended.',
  enabled: 'The account is enabled again.',
  factor: 'The second factor is taken away, and the person is told by e-mail.',
} as const;

export const PEOPLE_DONE = {
  invited: 'The invitation is on its way. It holds for a week.',
  sent: 'The invitation is on its way again, and holds for a week. Earlier links open nothing any more.',
  withdrawn: 'The invitation is withdrawn: its links open nothing any more.',
} as const;

export interface PersonAct {
  done: keyof typeof PERSON_DONE;
  /** A password made here, to show once. */
  password: string | null;
}

/** Adds the person that the form describes. @throws {Problem} 422, and zod errors, with what is wrong by field. */
export async function addFromForm(
  values: FormValues,
  byUserId: string,
): Promise<{ id: string; password: string | null }> {
  const password = typedExactly(values, 'password') || undefined;
  const input = newPersonSchema.parse({ ...describedPerson(values), password });
  return addByAdministrator(input, byUserId);
}

/** Invites the person that the form describes. @throws {Problem} 422, and zod errors, with what is wrong by field. */
export async function inviteFromForm(values: FormValues, byUserId: string): Promise<void> {
  await inviteByAdministrator(newInvitationSchema.parse(describedPerson(values)), byUserId);
}

/** Does what a form in the list of invitations asks. @throws {Problem} 4xx */
export async function actOnInvitation(
  { text }: FormValues,
  byUserId: string,
): Promise<keyof typeof PEOPLE_DONE> {
  const { act, invitation } = text;
  if (act === 'send-again') {
    await sendAgain(invitation, byUserId);
    return 'sent';
  }
  if (act !== 'withdraw') throw badRequest('The form did not say what to do. Nothing was changed.');
  await takeBack(invitation, byUserId);
  return 'withdrawn';
}

/** Does what a form of the person's page asks. @throws {Problem} 4xx, and zod errors, with what is wrong by field. */
export async function actOnPerson(values: FormValues, person: Person, byUserId: string): Promise<PersonAct> {
  const { text } = values;
  switch (text['act']) {
    case 'change':
      await changeByAdministrator(person, changesOf(values, person), byUserId);
      return { done: 'changed', password: null };
    case 'reset': {
      const { password } = passwordResetSchema.parse({
        password: typedExactly(values, 'password') || undefined,
      });
      return { done: 'reset', password: await resetByAdministrator(person, password, byUserId) };
    }
    case 'disable':
      await setDisabled(person, true, byUserId);
      return { done: 'disabled', password: null };
    case 'enable':
      await setDisabled(person, false, byUserId);
      return { done: 'enabled', password: null };
    case 'reset-factor':
      await resetFactor(person, byUserId);
      return { done: 'factor', password: null };
    default:
      throw badRequest('The form did not say what to do. Nothing was changed.');
  }
}

function describedPerson({ text, all }: FormValues) {
  return {
    name: text['name'] ?? '',
    email: text['email'] ?? '',
    isAdministrator: text['isAdministrator'] === 'yes',
    roles: all('roles').map(roleOfValue),
  };
}

function changesOf({ text, all }: FormValues, person: Person) {
  return personChangesSchema.parse({
    name: text['name'] ?? '',
    isAdministrator: text['isAdministrator'] === 'yes',
    roles: mergedRoles(rolesGiven(person).map(roleValue), all('held'), all('roles')).map(roleOfValue),
  });
}

/** Roles held now with what the form changed of those that it showed: what somebody else gave meanwhile stays. */
function mergedRoles(now: readonly string[], shown: readonly string[], checked: readonly string[]): string[] {
  const given = checked.filter((value) => !shown.includes(value));
  const taken = shown.filter((value) => !checked.includes(value));
  return [...new Set([...now, ...given])].filter((value) => !taken.includes(value));
}

/** The role that a form's value names; the schema judges what it says. */
function roleOfValue(value: string): RoleGiven {
  const [network = '', role = ''] = value.split(' ');
  return { network, role: role as RoleGiven['role'] };
}
