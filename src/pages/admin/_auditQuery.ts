import { auditChoices } from '#lib/services/audit/trail';

/** What the address asks of the trail, and what can be chosen. A name that is not known finds nothing. */
export async function auditQuery(url: URL) {
  const choices = await auditChoices();
  const asked = (name: string) => url.searchParams.get(name)?.trim() ?? '';
  const [person, network, action] = [asked('person'), asked('network'), asked('action')];
  const networkId = choices.networks.find(({ slug }) => slug === network)?.id ?? 0;
  const filter = {
    userId: person || undefined,
    networkId: network === '' ? undefined : networkId,
    action: action || undefined,
  };
  return { choices, typed: { person, network, action }, filter };
}
