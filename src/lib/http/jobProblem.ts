import { JobCancelled, JobsFull } from '#lib/services/threads/messages';
import { Problem } from './problem';

/** What is waited for, as a refusal calls it. */
export type JobKind = 'search' | 'trial' | 'file';

const MANY = { search: 'searches', trial: 'trials', file: 'files' } as const;

/** What keeps a job from its answer, as a refusal: too many wait, or who asked has gone. Anything else as it is. */
export function jobProblem(error: unknown, kind: JobKind): unknown {
  if (error instanceof JobsFull) {
    const many = MANY[kind];
    const detail = `Several ${many} wait already. Try again in a few seconds.`;
    return new Problem(503, `${many}-full`, `Too many ${many} at the moment`, detail, {
      headers: { 'Retry-After': '5' },
    });
  }
  return error instanceof JobCancelled
    ? new Problem(499, 'cancelled', 'Cancelled', `The ${kind} was given up.`)
    : error;
}
