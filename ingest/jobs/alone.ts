import { isConnectionLost, isLockConflict } from '#db/queries/connection';
import { endJobTrouble, noteJobTrouble, troublesOfJob } from '#db/queries/jobTroubles';
import { failureWords } from '#lib/config/failureWords';
import { log } from '#lib/config/log';
import { isDatabaseAway } from '#db/queries/databaseAway';

const FIRST_REST_MS = 60_000;
const LONGEST_REST_MS = 3_600_000;
/** What rests longer was told to by a clock that was ahead. */
const MOST_REST_MS = 2 * LONGEST_REST_MS;

/** What a failure is noted under. Nothing personal goes in. */
export interface Subject {
  /** Such as `station 12`; at most 120 letters. */
  name: string;
  /** Whose operators are shown it; null: administrators only. */
  networkId: number | null;
}

/** A network as what a job failed at. */
export const networkSubject = ({ id }: { id: number }): Subject => ({ name: `network ${id}`, networkId: id });

/** Subjects of a job that failed and are not tried yet again. */
export async function restingSubjects(job: string, now: Date): Promise<string[]> {
  return (await troublesOfJob(job))
    .filter(({ restsUntil }) => {
      const restMs = restsUntil.getTime() - now.getTime();
      return restMs > 0 && restMs <= MOST_REST_MS;
    })
    .map(({ subject }) => subject);
}

/** Numbers of those among them that are named `kind number`. */
export async function restingNumbers(job: string, kind: string, now: Date): Promise<number[]> {
  const names = await restingSubjects(job, now);
  return names
    .filter((name) => name.startsWith(`${kind} `))
    .map((name) => Number(name.slice(kind.length + 1)));
}

/**
 * Does a job's work for each item by itself: one that fails is noted (the network's operators see it), rests from a minute up to an
 * hour, and stops none of the others. What everybody would meet, such as a database that is away, ends the round instead.
 * @returns the sum of what `work` answers.
 */
export async function eachAlone<T>(
  job: string,
  items: Iterable<T>,
  subjectOf: (item: T) => Subject,
  work: (item: T) => Promise<number>,
  now: Date = new Date(),
): Promise<number> {
  const troubles = new Map((await troublesOfJob(job)).map((trouble) => [trouble.subject, trouble]));
  const resting = new Set(await restingSubjects(job, now));
  let done = 0;
  for (const item of items) {
    const { name, networkId } = subjectOf(item);
    if (resting.has(name)) continue;
    try {
      done += await work(item);
    } catch (error) {
      if (concernsEverybody(error)) throw error;
      const times = (troubles.get(name)?.times ?? 0) + 1;
      log().error({ err: error, job, subject: name, times }, 'a part of a job failed; the others go on');
      const restsUntil = new Date(now.getTime() + restMs(times));
      const failure = failureWords(error).slice(0, 300);
      await noteJobTrouble({ job, subject: name, networkId, failure, lastAt: now, restsUntil });
      continue;
    }
    if (troubles.has(name)) await endJobTrouble(job, name);
  }
  return done;
}

/** Whether an error says nothing about what was worked at. */
export function concernsEverybody(error: unknown): boolean {
  return isDatabaseAway(error) || isLockConflict(error) || isConnectionLost(error);
}

function restMs(times: number): number {
  return Math.min(LONGEST_REST_MS, FIRST_REST_MS * 2 ** Math.min(times - 1, 10));
}
