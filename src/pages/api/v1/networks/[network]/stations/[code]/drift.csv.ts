import { requireNetwork, requireStation } from '#lib/auth/guards';
import { ALL_ROLES } from '#lib/auth/roles';
import { csv } from '#lib/http/respond';
import { route } from '#lib/http/route';
import { driftCsv } from '#lib/services/drift/csv';
import { driftSource, stationDrift } from '#lib/services/drift/stationDrift';

export const GET = route(async (context) => {
  const { network } = await requireNetwork(context, context.params.network, ALL_ROLES);
  const station = await requireStation(network.id, context.params.code);
  const drift = await stationDrift(station, await driftSource(network.id, Math.floor(Date.now() / 1000)));
  return csv(driftCsv(drift), `${station.code}_drift_${drift.from}_${drift.to}.csv`);
});
