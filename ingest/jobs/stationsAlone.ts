import { findStationById } from '#db/queries/stations';
import { eachAlone, restingNumbers, type Subject } from './alone';

const subjectOf = (stationId: number, networkId: number | null): Subject => ({
  name: `station ${stationId}`,
  networkId,
});

/** Stations that a job failed at and does not try yet again. */
export function restingStationIds(job: string, now: Date): Promise<number[]> {
  return restingNumbers(job, 'station', now);
}

/** Does a job's work for each station by itself, as `eachAlone` does. @returns the sum of what `work` answers. */
export async function eachStation(
  job: string,
  stationIds: Iterable<number>,
  work: (stationId: number) => Promise<number>,
  now: Date,
): Promise<number> {
  const stations: { id: number; networkId: number | null }[] = [];
  for (const id of stationIds) {
    stations.push({ id, networkId: (await findStationById(id))?.networkId ?? null });
  }
  return eachAlone(
    job,
    stations,
    ({ id, networkId }) => subjectOf(id, networkId),
    ({ id }) => work(id),
    now,
  );
}
