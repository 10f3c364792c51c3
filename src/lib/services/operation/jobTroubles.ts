import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { listJobTroubles, wakeJobTroubles } from '#db/queries/jobTroubles';
import { findStationById } from '#db/queries/stations';

/** Something that the worker could not do, for people. */
export interface TroubleWords {
  /** What it does: "recompute quarter-hours". */
  job: string;
  /** What it failed at: "station MER-02". */
  subject: string;
  failure: string;
  /** Attempts that failed. */
  times: number;
  since: Date;
  /** When it is tried again. */
  restsUntil: Date;
}

const JOBS: Readonly<Record<string, string>> = {
  aggregate: 'recompute quarter-hours',
  'judge-limits': 'compare levels with limits',
  'import-files': 'import files',
  'shift-clocks': 'correct times after a wrong clock',
  'trace-days': 'prepare days for the search of spectra',
  'compose-alerts': 'write alerts',
  escalate: 'pass on alerts that nobody acknowledged',
  'send-webhooks': 'send to webhooks',
  'warn-early': 'warn of limits that come near',
  'watch-health': 'look after the health of stations',
  'watch-drifts': 'look for drift of microphones',
  'watch-summaries': 'compare issued months with the data',
  'draft-summaries': 'draft months',
  'complete-periods': 'complete days, evenings and nights',
  'remind-calibrations': 'remind of calibration checks',
  'remind-complaints': 'remind of answers that are due',
  'keep-complaints': 'erase personal data that is kept no longer',
  'retain-intervals': 'delete old intervals',
  'forecast-disk': 'warn of a full disk',
  housekeeping: 'tidy up',
  'send-mail': 'send e-mail',
  'check-rights': 'work with the database',
  'make-partitions': 'make room for the months to come',
};

/** A job in words; the month of a network that is being made by what it is. */
export function jobWords(name: string): string {
  return JOBS[name] ?? (name.startsWith('summary:') ? 'make a month' : name);
}

/** What the worker could not do, longest first; of one network, or of all (null). */
export async function jobTroublesOf(networkId: number | null): Promise<TroubleWords[]> {
  const rows = await listJobTroubles(networkId);
  return Promise.all(
    rows.map(async ({ job, subject, failure, times, since, restsUntil }) => ({
      job: jobWords(job),
      subject: await withCode(subject),
      failure,
      times,
      since,
      restsUntil,
    })),
  );
}

/** Has everything that failed tried again at the next round. @returns how many. */
export function tryJobsAgain(userId: string): Promise<number> {
  return inTransaction(async (transaction) => {
    const count = await wakeJobTroubles(null, new Date(), transaction);
    const subject = 'jobs of the worker';
    await appendAudit(
      { userId, networkId: null, action: 'jobs.retry', subject, detail: { count } },
      transaction,
    );
    return count;
  });
}

/** Stations by their codes. */
async function withCode(subject: string): Promise<string> {
  const id = /\bstation (\d+)$/.exec(subject)?.[1];
  const station = id === undefined ? undefined : await findStationById(Number(id));
  return station ? subject.replace(/\d+$/, station.code) : subject;
}
