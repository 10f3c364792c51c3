import { listStations } from '#db/queries/stations';

/** Stations that a complaint may name as the nearest one. */
export async function stationChoices(networkId: number): Promise<{ code: string; name: string }[]> {
  const stations = await listStations(networkId);
  return stations.filter((station) => station.retiredAt === null).map(({ code, name }) => ({ code, name }));
}
