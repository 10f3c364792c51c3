import { expect, test } from 'vitest';
import { TrialSteps } from '#lib/services/limitTrial/trialSteps';
import { JobCancelled, type Progress } from '#lib/services/threads/messages';

test('days of finished parts are added up, and never more than all are told', () => {
  const told: Progress[] = [];
  const tell = (finished: number, reached: number) => {
    const steps = new TrialSteps(20, {
      onProgress: (progress) => told.push(progress),
      isCancelled: () => false,
    });
    // The first telling is free, the next would come too soon: each is looked at with a new trial.
    if (finished > 0) steps.finish(finished);
    else steps.reach(reached);
  };
  tell(0, 3.9);
  tell(10, 0);
  tell(30, 0);
  expect(told.map(({ done }) => done)).toEqual([3, 10, 20]);
});

test('a trial ends at its next step when who asked has gone', () => {
  let hasGone = false;
  const steps = new TrialSteps(20, { onProgress: () => undefined, isCancelled: () => hasGone });
  steps.reach(1);
  hasGone = true;
  expect(() => steps.reach(2)).toThrow(JobCancelled);
});
