import { diskSamplesSince } from '#db/queries/diskSamples';
import { readOperationState } from '#db/queries/operation';
import { diskForecast } from './diskForecast';

const DISK_LOOK_BACK_MS = 28 * 86_400_000;

/** The state of the work in OpenMetrics 1.0 text. */
export async function metricsText(now: Date): Promise<string> {
  const [state, samples] = await Promise.all([
    readOperationState(now),
    diskSamplesSince(new Date(now.getTime() - DISK_LOOK_BACK_MS)),
  ]);
  const disk = diskForecast(samples);
  const tickAgeSec = state.lastTick ? (now.getTime() - state.lastTick.getTime()) / 1000 : null;
  const gauges: [name: string, help: string, value: number | null][] = [
    ['bittern_worker_last_tick_age_seconds', 'Seconds since the worker last began a job.', tickAgeSec],
    ['bittern_dirty_quarters', 'Quarter-hours that wait for recomputation.', state.dirtyQuarters],
    ['bittern_outbox_oldest_seconds', 'Age of the oldest message that waits.', state.outboxOldestSec],
    ['bittern_outbox_waiting', 'Messages that wait to be sent.', state.outboxWaiting],
    ['bittern_outbox_dead', 'Messages given up.', state.outboxDead],
    ['bittern_quarantine_open', 'Refused records that wait for an operator.', state.quarantineOpen],
    ['bittern_job_troubles', 'Parts of jobs that fail while the rest goes on.', state.jobTroubles],
    [
      'bittern_disk_free_bytes',
      'Free bytes of the data directory’s disk, as the worker saw last.',
      disk?.freeBytes ?? null,
    ],
    [
      'bittern_disk_days_left',
      'Days until that disk is full, by the last four weeks.',
      disk?.daysLeft ?? null,
    ],
    ['process_resident_memory_bytes', 'Resident memory of this process.', process.memoryUsage().rss],
  ];
  const lines = gauges
    .filter(([, , value]) => value !== null)
    .flatMap(([name, help, value]) => [`# TYPE ${name} gauge`, `# HELP ${name} ${help}`, `${name} ${value}`]);
  return `${lines.join('\n')}\n# EOF\n`;
}
