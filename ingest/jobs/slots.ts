import { claimJobRun, finishJobRun } from '#db/queries/jobRuns';
import { failureWords } from '#lib/config/failureWords';
import { log } from '#lib/config/log';

/** Work that is done once a slot of time, by whichever worker comes first. */
export interface SlotJob {
  name: string;
  slotMinutes: number;
  run(now: Date): Promise<string>;
}

/** Begins the jobs whose present slot nobody has claimed. Safe to call twice, late, or on two machines. */
export async function runDueSlots(jobs: readonly SlotJob[], now: Date): Promise<void> {
  for (const job of jobs) {
    const slotMs = job.slotMinutes * 60_000;
    const slot = new Date(Math.floor(now.getTime() / slotMs) * slotMs);
    try {
      if (!(await claimJobRun(job.name, slot))) continue;
      await finishJobRun(job.name, slot, await job.run(now));
    } catch (error) {
      log().error({ err: error, job: job.name }, 'job failed');
      await finishJobRun(job.name, slot, `failed: ${failureWords(error)}`).catch(() => undefined);
    }
  }
}
