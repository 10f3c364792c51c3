import { listStations, type StationRow } from '#db/queries/stations';
import { done, invalid, type Outcome } from '../outcome';

/** The stations that some codes name, or all in service for null, in the order in which they are locked. */
export async function chosenStations(
  networkId: number,
  codes: readonly string[] | null,
): Promise<Outcome<StationRow[]>> {
  const stations = (await listStations(networkId)).sort((a, b) => a.id - b.id);
  if (codes === null) {
    const inService = stations.filter(({ retiredAt }) => retiredAt === null);
    return inService.length > 0
      ? done(inService)
      : invalid('stations', 'the network has no station in service');
  }
  const isOfNetwork = new Set(stations.map(({ code }) => code));
  const unknown = codes.find((code) => !isOfNetwork.has(code));
  if (unknown !== undefined) return invalid('stations', `${unknown} is not a station of this network`);
  const chosen = new Set(codes);
  return done(stations.filter(({ code }) => chosen.has(code)));
}
