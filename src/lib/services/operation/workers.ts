import { listLeases } from '#db/queries/leases';
import { listWorkers } from '#db/queries/workers';
import { jobWords } from './jobTroubles';

/** A worker process, for people. */
export interface WorkerWords {
  /** Machine and process number. */
  name: string;
  isLiving: boolean;
  since: Date;
  /** When it said last that it lives. */
  seenAt: Date;
  /** Of 64 parts of the stations, those that it computes. */
  parts: number;
  /** What it alone does at present: "send e-mail". */
  jobs: string[];
}

/** Workers that live, and those that were not seen any more; what each of them does. */
export async function workersAtWork(): Promise<WorkerWords[]> {
  const [workers, leases] = await Promise.all([listWorkers(), listLeases()]);
  return workers.map(({ id, name, isLiving, startedAtSec, seenAtSec, buckets }) => ({
    name,
    isLiving,
    since: new Date(startedAtSec * 1000),
    seenAt: new Date(seenAtSec * 1000),
    parts: isLiving ? buckets.length : 0,
    jobs: isLiving ? leases.filter(({ holder }) => holder === id).map((lease) => jobWords(lease.name)) : [],
  }));
}
