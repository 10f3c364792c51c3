import { listStations } from '#db/queries/stations';

/** Stations that a mast may be assigned to, as a form's choices; retired ones too, because their past goes by masts as well. */
export async function stationChoices(networkId: number): Promise<{ value: string; label: string }[]> {
  const stations = await listStations(networkId);
  return stations.map(({ code, name, retiredAt }) => ({
    value: code,
    label: `${code} ${name}${retiredAt ? ' (retired)' : ''}`,
  }));
}
