import { formatInstantUtc } from '#lib/contracts/common';
import { done } from '../outcome';
import { readHeavy } from '../reading/readHeavy';
import { type JobWatch } from '../threads/messages';
import { type TrialOutcome, type TrialTask } from './trialTask';
import { tryLimit } from './tryLimit';

/** Tries a limit where much is read, and says of when the data are. @throws {JobCancelled} */
export async function tryHeavily(task: TrialTask, watch: JobWatch): Promise<TrialOutcome> {
  const { answer, dataAsOf } = await readHeavy(() => tryLimit(task, watch));
  if (answer.kind !== 'done' || !dataAsOf) return answer;
  return done({ ...answer.value, dataAsOf: formatInstantUtc(dataAsOf.getTime() / 1000) });
}
