import { expect, test } from 'vitest';
import { db } from '#db/client';
import { aggregate } from '#ingest/jobs/aggregate';
import { completeEndedPeriods } from '#ingest/jobs/completePeriods';
import { draftSummaries } from '#ingest/jobs/draftSummaries';
import { escalateUnacknowledged } from '#ingest/jobs/escalate';
import { forecastDisk } from '#ingest/jobs/forecastDisk';
import { housekeeping } from '#ingest/jobs/housekeeping';
import { keepComplaints } from '#ingest/jobs/keepComplaints';
import { makeSummaries } from '#ingest/jobs/makeSummaries';
import { remindOfCalibrations } from '#ingest/jobs/remindCalibrations';
import { remindOfComplaints } from '#ingest/jobs/remindComplaints';
import { retainIntervals } from '#ingest/jobs/retainIntervals';
import { warnOfHeadings } from '#ingest/jobs/warnEarly';
import { watchDrifts } from '#ingest/jobs/watchDrifts';
import { watchHealth } from '#ingest/jobs/watchHealth';
import { watchSummaries } from '#ingest/jobs/watchSummaries';
import { useDataDirectory } from '../integration/imports/support';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makePerson } from '../integration/support/people';
import { countOf, measuredAtBoth, poison, troubles, useTwoPlaces } from './support/twoPlaces';

/** A network whose settings cannot be read, before a sound one: jobs that go through the networks go on. */
useDataDirectory();
useFreshSchema();
const places = useTwoPlaces();

/** Jobs that go through the networks: one has a time zone that there is not. */
const OF_NETWORKS: [job: string, run: (now: Date) => Promise<unknown>][] = [
  ['complete-periods', completeEndedPeriods],
  ['draft-summaries', draftSummaries],
  ['remind-calibrations', remindOfCalibrations],
  ['remind-complaints', remindOfComplaints],
  ['warn-early', warnOfHeadings],
  ['watch-health', watchHealth],
  ['watch-drifts', watchDrifts],
  ['keep-complaints', keepComplaints],
  ['escalate', escalateUnacknowledged],
  ['make-summaries', makeSummaries],
  ['watch-summaries', watchSummaries],
  ['housekeeping', housekeeping],
  ['retain-intervals', retainIntervals],
  ['forecast-disk', forecastDisk],
];

/** These cannot but fail in such a network. */
const NEED_THE_ZONE = new Set(['draft-summaries', 'remind-calibrations', 'remind-complaints']);

test.each(OF_NETWORKS)('%s: a network with unreadable settings does not end the round', async (job, run) => {
  await measuredAtBoth(places);
  await aggregate();
  await poison(places);
  const { userId } = await makePerson(places.bad.networkId, ['operator']);
  await db()('alert_preferences').insert({
    network_id: places.bad.networkId,
    user_id: userId,
    delivery: 'at-once',
    daily_at_min: 0,
    group_min: 0,
    warns_early: 1,
    changed_at: new Date(),
  });
  const keep = { keep_months: 13, changed_by: userId, changed_at: new Date() };
  await db()('interval_retention').insert({ network_id: places.bad.networkId, ...keep });
  await db()('network_settings')
    .where({ network_id: places.bad.networkId })
    .update({ time_zone: 'Nowhere/None' });
  await run(new Date());
  const noted = await troubles();
  for (const one of noted) expect(one).toMatchObject({ job, networkId: places.bad.networkId });
  if (job === 'watch-health')
    expect(await countOf('health_troubles', places.sound.stationId)).toBeGreaterThan(0);
  if (NEED_THE_ZONE.has(job)) expect(noted).toHaveLength(1);
});
