import { findDeploymentAt } from '#db/queries/deployments';
import { findInstrument, type InstrumentRow } from '#db/queries/instruments';

/**
 * The instrument that measured at a station at an instant (epoch seconds), so that a figure knows which one made it; null where
 * nobody has noted one.
 */
export async function instrumentAt(stationId: number, atSec: number): Promise<InstrumentRow | null> {
  const deployment = await findDeploymentAt(stationId, atSec);
  if (!deployment) return null;
  return (await findInstrument(deployment.networkId, deployment.instrumentId)) ?? null;
}
