import { serveJobs } from '../threads/serveJobs';
import { type TrialOutcome, type TrialTask } from './trialTask';
import { tryLimit } from './tryLimit';

serveJobs<TrialTask, TrialOutcome>((task, watch) => tryLimit(task, watch));
