import { listNetworks } from '#db/queries/networks';
import { listAllMemberships } from '#db/queries/users';
import { type Network } from '#lib/contracts/networks';
import { networkNow } from './now';

/** Every network as it is now, with how many people hold a role in it. */
export async function administeredNetworks(): Promise<(Network & { members: number })[]> {
  const [networks, memberships] = await Promise.all([listNetworks(), listAllMemberships()]);
  return Promise.all(
    networks.map(async (network) => {
      const members = memberships.filter(({ networkId }) => networkId === network.id);
      return { ...(await networkNow(network)), members: new Set(members.map(({ userId }) => userId)).size };
    }),
  );
}
