import { readDeskSettings } from '#db/queries/complaintSettings';
import { listStations } from '#db/queries/stations';
import { coarsePlace, type Place } from '../complaints/whereabouts';

/** What the residents' form says and shows beside its fields. */
export interface FormSurroundings {
  retentionMonths: number;
  /** About where the network is, to 0.01 degree, so that it tells no station's place; null without stations. */
  center: Place | null;
}

/** Surroundings of a network's form. */
export async function formSurroundings(networkId: number): Promise<FormSurroundings> {
  const [{ retentionMonths }, stations] = await Promise.all([
    readDeskSettings(networkId),
    listStations(networkId),
  ]);
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const center =
    stations.length === 0
      ? null
      : coarsePlace({
          latitude: mean(stations.map(({ latitude }) => latitude)),
          longitude: mean(stations.map(({ longitude }) => longitude)),
        });
  return { retentionMonths, center };
}
