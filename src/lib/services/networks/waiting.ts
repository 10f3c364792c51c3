import { countOpenComplaints, countOpenExceedances } from '#db/queries/waiting';

/** What waits for a person in a network: exceedances not yet acknowledged, complaints not yet answered. */
export interface Waiting {
  exceedances: number;
  complaints: number;
}

export async function countWaiting(networkId: number): Promise<Waiting> {
  const [exceedances, complaints] = await Promise.all([
    countOpenExceedances(networkId),
    countOpenComplaints(networkId),
  ]);
  return { exceedances, complaints };
}
