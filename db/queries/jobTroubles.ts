import { pool, type Connection } from './connection';

/** Something that a job cannot do, while it goes on with everything else. */
export interface JobTrouble {
  job: string;
  /** Such as `station 12`. */
  subject: string;
  networkId: number | null;
  failure: string;
  /** Attempts that failed. */
  times: number;
  since: Date;
  lastAt: Date;
  restsUntil: Date;
}

const COLUMNS = {
  job: 'job',
  subject: 'subject',
  networkId: 'network_id',
  failure: 'failure',
  times: 'times',
  since: 'since',
  lastAt: 'last_at',
  restsUntil: 'rests_until',
};

/** What a job could not do when it tried last. */
export async function troublesOfJob(job: string, conn: Connection = pool()): Promise<JobTrouble[]> {
  return conn('job_troubles').where({ job }).select(COLUMNS);
}

/** Everything that jobs cannot do, longest first; of one network, or of all. */
export async function listJobTroubles(
  networkId: number | null,
  conn: Connection = pool(),
): Promise<JobTrouble[]> {
  const rows = conn('job_troubles').orderBy(['since', 'job', 'subject']).select(COLUMNS);
  return networkId === null ? rows : rows.where({ network_id: networkId });
}

/** Notes a failed attempt; the first one begins the trouble. */
export async function noteJobTrouble(
  { job, subject, networkId, failure, lastAt, restsUntil }: Omit<JobTrouble, 'times' | 'since'>,
  conn: Connection = pool(),
): Promise<void> {
  await conn.raw(
    `INSERT INTO job_troubles (job, subject, network_id, failure, times, since, last_at, rests_until)
     VALUES (?, ?, ?, ?, 1, ?, ?, ?)
     ON DUPLICATE KEY UPDATE failure = VALUES(failure), times = times + 1, last_at = VALUES(last_at),
       rests_until = VALUES(rests_until)`,
    [job, subject, networkId, failure, lastAt, lastAt, restsUntil],
  );
}

/** What could be done after all is a trouble no longer. */
export async function endJobTrouble(job: string, subject: string, conn: Connection = pool()): Promise<void> {
  await conn('job_troubles').where({ job, subject }).delete();
}

/** Forgets what was tried last before an instant: what it was about is gone. */
export async function deleteJobTroublesBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('job_troubles').where('last_at', '<', before).delete();
}

/** Has everything that rests tried again at the next round; of one network, or of all. @returns how many. */
export async function wakeJobTroubles(
  networkId: number | null,
  now: Date,
  conn: Connection,
): Promise<number> {
  const resting = conn('job_troubles').where('rests_until', '>', now);
  return (networkId === null ? resting : resting.where({ network_id: networkId })).update({
    rests_until: now,
  });
}
