import { readOperationState } from '#db/queries/operation';

/** The state of the work in OpenMetrics 1.0 text. */
export async function metricsText(now: Date): Promise<string> {
  const state = await readOperationState(now);
  const tickAgeSec = state.lastTick ? (now.getTime() - state.lastTick.getTime()) / 1000 : null;
  const gauges: [name: string, help: string, value: number | null][] = [
    ['bittern_worker_last_tick_age_seconds', 'Seconds since the worker last began a job.', tickAgeSec],
    ['bittern_dirty_quarters', 'Quarter-hours that wait for recomputation.', state.dirtyQuarters],
    ['bittern_outbox_oldest_seconds', 'Age of the oldest message that waits.', state.outboxOldestSec],
    ['bittern_outbox_waiting', 'Messages that wait to be sent.', state.outboxWaiting],
    ['bittern_outbox_dead', 'Messages given up.', state.outboxDead],
    ['bittern_quarantine_open', 'Refused records that wait for an operator.', state.quarantineOpen],
    ['bittern_job_troubles', 'Parts of jobs that fail while the rest goes on.', state.jobTroubles],
    ['process_resident_memory_bytes', 'Resident memory of this process.', process.memoryUsage().rss],
  ];
  const lines = gauges
    .filter(([, , value]) => value !== null)
    .flatMap(([name, help, value]) => [`# TYPE ${name} gauge`, `# HELP ${name} ${help}`, `${name} ${value}`]);
  return `${lines.join('\n')}\n# EOF\n`;
}
