import { JobThread } from '../threads/jobThread';
import { type JobListener } from '../threads/messages';
import { isLong } from './size';
import { type TrialOutcome, type TrialTask } from './trialTask';
import { tryHeavily } from './tryHeavily';

/** Long trials of this process follow each other in one thread. */
const trials = new JobThread<TrialTask, TrialOutcome>('src/lib/services/limitTrial/trialThread.ts');

/** Tries a limit, in a thread of its own where that takes long. @throws {JobsFull | JobCancelled} */
export function runTrial(task: TrialTask, listener: JobListener = {}): Promise<TrialOutcome> {
  if (isLong(task.query)) return trials.run(task, listener);
  const { onProgress = () => undefined, signal } = listener;
  return tryHeavily(task, { onProgress, isCancelled: () => signal?.aborted ?? false });
}
