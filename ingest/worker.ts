import { setMaxListeners } from 'node:events';
import { schedule } from 'node-cron';
import { closeDb } from '#db/client';
import { untilSchemaIsCurrent } from '#db/currentSchema';
import { log } from '#lib/config/log';
import { warnOfAuditGrant } from '#lib/services/audit/warnOfGrant';
import { aggregate } from './jobs/aggregate';
import { checkRights } from './jobs/checkRights';
import { composeAlerts } from './jobs/composeAlerts';
import { completeEndedPeriods } from './jobs/completePeriods';
import { draftSummaries } from './jobs/draftSummaries';
import { escalateUnacknowledged } from './jobs/escalate';
import { forecastDisk } from './jobs/forecastDisk';
import { housekeeping } from './jobs/housekeeping';
import { importFiles } from './jobs/importFiles';
import { judgeLimits } from './jobs/judgeLimits';
import { keepComplaints } from './jobs/keepComplaints';
import { runLoop, type LoopSettings } from './jobs/loop';
import { mailAuditHead } from './jobs/mailAuditHead';
import { makePartitions } from './jobs/makePartitions';
import { makeSummaries } from './jobs/makeSummaries';
import { remindOfCalibrations } from './jobs/remindCalibrations';
import { remindOfComplaints } from './jobs/remindComplaints';
import { shiftClocks } from './jobs/shiftClocks';
import { sendMail } from './jobs/sendMail';
import { sendWebhooks } from './jobs/sendWebhooks';
import { retainIntervals } from './jobs/retainIntervals';
import { runDueSlots, type SlotJob } from './jobs/slots';
import { traceDays } from './jobs/traceDays';
import { watchDrifts } from './jobs/watchDrifts';
import { warnOfHeadings } from './jobs/warnEarly';
import { watchHealth } from './jobs/watchHealth';
import { watchSummaries } from './jobs/watchSummaries';
import { thisWorker } from './sharing/thisWorker';

/** Done round by round, as much as there is. Aggregation rests longer: figures that are asked for meanwhile are current anyway. */
const LOOPS: LoopSettings[] = [
  { name: 'aggregate', everySec: 15, work: (_, buckets) => aggregate(buckets), by: 'stations' },
  { name: 'judge-limits', everySec: 5, work: judgeLimits, by: 'stations' },
  { name: 'import-files', everySec: 2, work: importFiles },
  { name: 'shift-clocks', everySec: 2, work: shiftClocks },
  { name: 'trace-days', everySec: 60, work: traceDays, by: 'stations' },
  { name: 'make-summaries', everySec: 5, work: makeSummaries, by: 'itself' },
  { name: 'compose-alerts', everySec: 10, work: composeAlerts },
  { name: 'escalate', everySec: 20, work: escalateUnacknowledged },
  { name: 'retain-intervals', everySec: 900, work: retainIntervals },
  { name: 'send-mail', everySec: 2, work: sendMail },
  { name: 'send-webhooks', everySec: 3, work: sendWebhooks },
  { name: 'warn-early', everySec: 60, work: warnOfHeadings },
  { name: 'watch-health', everySec: 60, work: watchHealth },
  { name: 'watch-summaries', everySec: 900, work: watchSummaries, by: 'itself' },
];

/** Done once a slot. The first is the worker's sign of life, which /readyz reads. */
const SLOT_JOBS: SlotJob[] = [
  { name: 'tick', slotMinutes: 1, run: async () => 'alive' },
  { name: 'complete-periods', slotMinutes: 15, run: completeEndedPeriods },
  { name: 'check-rights', slotMinutes: 60, run: checkRights },
  { name: 'make-partitions', slotMinutes: 60, run: makePartitions },
  { name: 'housekeeping', slotMinutes: 60, run: housekeeping },
  { name: 'forecast-disk', slotMinutes: 60, run: forecastDisk },
  { name: 'watch-drifts', slotMinutes: 24 * 60, run: watchDrifts },
  { name: 'remind-calibrations', slotMinutes: 60, run: remindOfCalibrations },
  { name: 'draft-summaries', slotMinutes: 15, run: draftSummaries },
  { name: 'remind-complaints', slotMinutes: 60, run: remindOfComplaints },
  { name: 'mail-audit-head', slotMinutes: 24 * 60, run: mailAuditHead },
  { name: 'keep-complaints', slotMinutes: 60, run: keepComplaints },
];

await untilSchemaIsCurrent({
  mayMigrate: false,
  tell: (what) => log().warn(`worker waits: ${what}`),
}).catch((error: unknown) => {
  log().fatal({ err: error }, 'worker cannot start: the schema is not as it must be');
  process.exit(1);
});

await warnOfAuditGrant();
await checkRights(new Date()).catch((error: unknown) =>
  log().error({ err: error }, 'the rights of the database account could not be looked at'),
);

await thisWorker.join();
const stop = new AbortController();
// Every loop that rests listens to it.
setMaxListeners(LOOPS.length + 1, stop.signal);
const tick = schedule('* * * * *', () => runDueSlots(SLOT_JOBS, new Date()), {
  timezone: 'UTC',
  noOverlap: true,
});
const loops = LOOPS.map((loop) => runLoop(loop, stop.signal, thisWorker));
void runDueSlots(SLOT_JOBS, new Date());
log().info('worker runs');

for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => void end(signal));

/** Finishes the rounds under way, then ends. */
async function end(signal: string): Promise<void> {
  if (stop.signal.aborted) return;
  log().info({ signal }, 'worker stops');
  stop.abort();
  await tick.stop();
  await Promise.all(loops);
  await thisWorker.leave();
  await closeDb();
  process.exit(0);
}
