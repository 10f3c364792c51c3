import { listSettings, type NetworkSettings } from '#db/queries/networks';

/** A network's zone and periods of day over time, in order of their beginning, as the strip works out limits' windows with. */
export async function networkClocks(
  networkId: number,
): Promise<Pick<NetworkSettings, 'effectiveFromSec' | 'timeZone' | 'scheme'>[]> {
  const timeline = await listSettings(networkId);
  return timeline.map(({ effectiveFromSec, timeZone, scheme }) => ({ effectiveFromSec, timeZone, scheme }));
}
