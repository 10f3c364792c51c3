import { patchByAdministrator, requirePerson, rolesGiven } from '#lib/auth/personActs';
import { changeRules } from '#lib/auth/signInRules';
import { newNetworkSchema } from '#lib/contracts/networks';
import { ROLES } from '#lib/contracts/people';
import { typedNumber, type FormValues } from '#lib/http/forms';
import { badRequest, invalidFields } from '#lib/http/problem';
import { PERIOD_PRESETS } from '#lib/services/networks/formValues';
import { makeNetwork } from '#lib/services/networks/make';

/** What a new network's form starts with. */
export const NEW_NETWORK_TEXT: FormValues['text'] = {
  timeZone: 'Europe/London',
  day: '07:00',
  evening: '19:00',
  night: '23:00',
  minimumCoverage: '75',
  maximumWindSpeed: '5',
};

export const NETWORK_DONE = {
  made: 'The network is made. Give people their roles in it, then register its stations.',
  given: 'The role is given. It holds from the next request on.',
  taken: 'The role is taken away. It ends with the next request.',
  asked: 'The second factor is required from the next request on.',
  unasked: 'The second factor is not required any more.',
} as const;

/** Makes the network that the form describes. @throws {Problem} 422, and zod errors, with what is wrong by field. */
export async function makeFromForm({ text }: FormValues, userId: string): Promise<string> {
  const hours = PERIOD_PRESETS.find(({ key }) => key === text['preset']) ?? text;
  const input = newNetworkSchema.parse({
    slug: text['slug'] ?? '',
    name: text['name'] ?? '',
    timeZone: text['timeZone'] ?? '',
    periods: { day: hours['day'] ?? '', evening: hours['evening'] || null, night: hours['night'] ?? '' },
    minimumCoverage: (typedNumber(text['minimumCoverage']) ?? NaN) / 100,
    maximumWindSpeed: typedNumber(text['maximumWindSpeed']) ?? NaN,
    excludeRain: text['excludeRain'] === 'yes',
  });
  const made = await makeNetwork(input, userId);
  if (made.outcome === 'made') return made.network.slug;
  throw invalidFields([{ field: 'slug', message: 'belongs to another network already' }]);
}

/** Says whether the network requires a second factor. @throws {Problem} 409 */
export async function changeRulesFromForm(
  { text }: FormValues,
  network: Parameters<typeof changeRules>[0],
  userId: string,
): Promise<keyof typeof NETWORK_DONE> {
  const secondFactorRequired = text['secondFactorRequired'] === 'yes';
  await changeRules(network, { secondFactorRequired }, userId);
  return secondFactorRequired ? 'asked' : 'unasked';
}

/** Gives a person a role in the network, or takes it away. @throws {Problem} 4xx with what is wrong by field. */
export async function actOnMember(
  { text }: FormValues,
  slug: string,
  byUserId: string,
): Promise<keyof typeof NETWORK_DONE> {
  const { act } = text;
  if (act !== 'give' && act !== 'take') throw badRequest('The form did not say what to do.');
  if (!text['person']) throw invalidFields([{ field: 'person', message: 'must be chosen' }]);
  const role = ROLES.find((known) => known === text['role']);
  if (!role) throw invalidFields([{ field: 'role', message: 'must be chosen' }]);
  const person = await requirePerson(text['person']);
  const others = rolesGiven(person).filter((held) => held.network !== slug || held.role !== role);
  const roles = act === 'give' ? [...others, { network: slug, role }] : others;
  await patchByAdministrator(person, { roles }, byUserId);
  return act === 'give' ? 'given' : 'taken';
}
