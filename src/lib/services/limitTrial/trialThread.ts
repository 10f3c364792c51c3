import { serveJobs } from '../threads/serveJobs';
import { type TrialOutcome, type TrialTask } from './trialTask';
import { tryHeavily } from './tryHeavily';

serveJobs<TrialTask, TrialOutcome>(tryHeavily);
