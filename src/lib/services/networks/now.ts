import { settingsAt, type NetworkRow } from '#db/queries/networks';
import { type Network } from '#lib/contracts/networks';
import { networkView } from './view';

/** A network with the settings in force now. */
export async function networkNow(network: NetworkRow): Promise<Network> {
  return networkView(network, await settingsAt(network.id, Math.floor(Date.now() / 1000)));
}
