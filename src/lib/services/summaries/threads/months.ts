import { listStations } from '#db/queries/stations';
import { JobThread } from '../../threads/jobThread';
import { type JobListener } from '../../threads/messages';
import { doMonthTask } from './doTask';
import { type MonthResult, type MonthTask, type MonthWork } from './tasks';

/** Months of so few stations take a second or two and little memory: less than starting a thread is worth. */
const FEW_STATIONS = 12;
/** Near its limit memory is swept before it grows. A hundred stations’ workbook needs some 160 MiB of these. */
const LEAST_HEAP_MIB = 160;
const HEAP_MIB_A_STATION = 1.6;
const YOUNG_HEAP_MIB = 24;

type SizedTask = MonthTask & { stations: number };

/**
 * Months of many stations are computed and printed one after another, each in a thread that ends with it: a hundred stations take
 * hundreds of megabytes, which a process that goes on would keep.
 */
const thread = new JobThread<SizedTask, MonthResult>('src/lib/services/summaries/threads/monthThread.ts', {
  isFresh: true,
  heapMib: ({ stations }) => Math.ceil(LEAST_HEAP_MIB + HEAP_MIB_A_STATION * stations),
  youngMib: YOUNG_HEAP_MIB,
});

/** Does something with a whole month when what was asked before is done. @throws {JobsFull | JobCancelled} */
export async function monthWork<Kind extends keyof MonthWork>(
  kind: Kind,
  task: MonthWork[Kind]['task'],
  { onProgress = () => undefined }: JobListener = {},
): Promise<MonthWork[Kind]['result']> {
  const whole = { kind, ...task } as MonthTask;
  const { length } = await listStations(task.network.id);
  return length > FEW_STATIONS
    ? thread.run({ ...whole, stations: length }, { onProgress })
    : doMonthTask(whole, { onProgress, isCancelled: () => false });
}
