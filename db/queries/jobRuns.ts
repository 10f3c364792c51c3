import { pool, type Connection } from './connection';

/** Claims a job's slot of time; false when another worker has it already. */
export async function claimJobRun(job: string, slot: Date, conn: Connection = pool()): Promise<boolean> {
  try {
    await conn('job_runs').insert({ job, slot, started_at: new Date() });
    return true;
  } catch (error) {
    if ((error as { code?: string }).code === 'ER_DUP_ENTRY') return false;
    throw error;
  }
}

export async function finishJobRun(
  job: string,
  slot: Date,
  outcome: string,
  conn: Connection = pool(),
): Promise<void> {
  await conn('job_runs')
    .where({ job, slot })
    .update({ finished_at: new Date(), outcome: outcome.slice(0, 500) });
}

export async function deleteJobRunsBefore(before: Date, conn: Connection = pool()): Promise<number> {
  return conn('job_runs').where('started_at', '<', before).delete();
}
