import { setFlagsFromString } from 'node:v8';
import { serveJobs } from '../../threads/serveJobs';
import { doMonthTask } from './doTask';
import { type MonthResult, type MonthTask } from './tasks';

/** By how much memory may grow past what is in use before it is swept, while a month is made, %; V8 would let it double or more. */
const HEAP_GROWTH_PERCENT = 20;

serveJobs<MonthTask, MonthResult>(async (task, watch) => {
  // Of the whole process, so it is taken back.
  setFlagsFromString(`--heap-growing-percent=${HEAP_GROWTH_PERCENT}`);
  try {
    return await doMonthTask(task, watch);
  } finally {
    setFlagsFromString('--heap-growing-percent=0');
  }
});
