import { listDeployments, listDeploymentsOf } from '#db/queries/deployments';
import { findInstrument, listInstruments } from '#db/queries/instruments';
import { type Deployment, type Instrument } from '#lib/contracts/instruments';
import { groupBy } from '../groupBy';
import { deploymentJson, instrumentJson } from './instrumentJson';

/** Instruments of a network by serial number, each with where it stands now; retired ones too. */
export async function instrumentsOf(networkId: number, nowSec: number): Promise<Instrument[]> {
  const [instruments, deployments] = await Promise.all([
    listInstruments(networkId),
    listDeployments(networkId),
  ]);
  const byInstrument = groupBy(deployments, ({ instrumentId }) => instrumentId);
  return instruments.map((row) => instrumentJson(row, byInstrument.get(row.id) ?? [], nowSec));
}

/** An instrument with every stay at a station, latest first; null when the network has none with this number. */
export async function instrumentWithStays(
  networkId: number,
  id: number,
  nowSec: number,
): Promise<{ instrument: Instrument; deployments: Deployment[] } | null> {
  const row = await findInstrument(networkId, id);
  if (!row) return null;
  const deployments = await listDeploymentsOf(id);
  return {
    instrument: instrumentJson(row, deployments, nowSec),
    deployments: deployments.map(deploymentJson),
  };
}
