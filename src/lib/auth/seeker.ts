import { type Seeker } from '#lib/services/search/find';
import { type NetworkAccess } from './networkAccess';
import { mayAct } from './roles';

/** A person inside a network as the search asks after: what is found is only what the person may open. */
export function seekerOf({ network, user, roles }: NetworkAccess): Seeker {
  return {
    network,
    isAdministrator: user.isAdministrator,
    mayAct: (wanted) => mayAct(user, roles, wanted),
  };
}
