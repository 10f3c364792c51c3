import { beforeEach, expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { listJobTroubles, wakeJobTroubles } from '#db/queries/jobTroubles';
import { insertMail } from '#db/queries/outbox';
import { messageIdOf } from '#lib/services/mails/messageId';
import { sendDueMail } from '#ingest/notify/sendOutbox';
import { sendDueWebhook } from '#ingest/notify/sendWebhooks';
import { aggregate } from '#ingest/jobs/aggregate';
import { completeEndedPeriods } from '#ingest/jobs/completePeriods';
import { composeAlerts } from '#ingest/jobs/composeAlerts';
import { draftSummaries } from '#ingest/jobs/draftSummaries';
import { escalateUnacknowledged } from '#ingest/jobs/escalate';
import { housekeeping } from '#ingest/jobs/housekeeping';
import { importFiles } from '#ingest/jobs/importFiles';
import { judgeLimits } from '#ingest/jobs/judgeLimits';
import { keepComplaints } from '#ingest/jobs/keepComplaints';
import { makeSummaries } from '#ingest/jobs/makeSummaries';
import { remindOfCalibrations } from '#ingest/jobs/remindCalibrations';
import { remindOfComplaints } from '#ingest/jobs/remindComplaints';
import { shiftClocks } from '#ingest/jobs/shiftClocks';
import { traceDays } from '#ingest/jobs/traceDays';
import { warnOfHeadings } from '#ingest/jobs/warnEarly';
import { watchDrifts } from '#ingest/jobs/watchDrifts';
import { watchHealth } from '#ingest/jobs/watchHealth';
import { watchSummaries } from '#ingest/jobs/watchSummaries';
import { useFreshSchema } from '../integration/support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../integration/support/people';
import { invent, storeMeasured, type Stretch } from '../integration/levels/support/measured';

/** A record that cannot be worked at, in each job's input: it alone waits, is shown, and everything beside it is done. */
useFreshSchema();

const DAY_SEC = 86_400;
const NO_SUCH_BANDS = 65_000;
const YESTERDAY_SEC = (Math.floor(Date.now() / 1000 / DAY_SEC) - 2) * DAY_SEC;
/** Four hours that are past. */
const STRETCH: Stretch = {
  fromSec: YESTERDAY_SEC,
  toSec: YESTERDAY_SEC + 4 * 3600,
  intervalSec: 60,
  bands: [-16, 9],
  gaps: 0,
};

/** Nothing of one test is another's input. */
const EMPTIED = [
  'job_troubles',
  'dirty_marks',
  'pending_windows',
  'station_day_traces',
  'alert_items',
  'outbox',
  'webhooks',
  'networks',
  'network_settings',
  'stations',
  'interval_levels',
  'alert_preferences',
];

let networks = 0;
/** The poisoned network comes before the sound one in every list. */
let bad: { networkId: number; stationId: number };
let sound: { networkId: number; stationId: number };

beforeEach(async () => {
  networks += 1;
  for (const table of EMPTIED) await db()(table).delete();
  bad = await place('a');
  sound = await place('b');
});

async function place(letter: string): Promise<{ networkId: number; stationId: number }> {
  const networkId = await makeNetwork(`${letter}-${networks}`);
  return { networkId, stationId: await makeStation(networkId, 'ST-1') };
}

const troubles = async () =>
  (await listJobTroubles(null)).map(({ job, subject, networkId }) => ({ job, subject, networkId }));

const stationTrouble = (job: string) => [
  { job, subject: `station ${bad.stationId}`, networkId: bad.networkId },
];

async function measuredAtBoth(): Promise<void> {
  for (const { stationId } of [bad, sound]) await storeMeasured(stationId, await invent(STRETCH, stationId));
}

/** An interval that says it has a set of bands that there is not. */
async function poison(): Promise<{ cure: () => Promise<unknown> }> {
  const where = { station_id: bad.stationId, starts_at: STRETCH.fromSec };
  const [first] = await db()('interval_levels')
    .where({ station_id: bad.stationId })
    .orderBy('starts_at')
    .limit(1);
  const key = { ...where, starts_at: first.starts_at };
  await db()('interval_levels').where(key).update({ band_set_id: NO_SUCH_BANDS });
  return { cure: () => db()('interval_levels').where(key).update({ band_set_id: first.band_set_id }) };
}

const countOf = async (table: string, stationId: number) =>
  Number((await db()(table).where({ station_id: stationId }).count({ count: '*' }).first())?.count);

test('aggregate: a station with an unreadable interval rests, and is current once it is mended', async () => {
  await measuredAtBoth();
  const { cure } = await poison();
  await aggregate();
  expect(await countOf('quarter_hours', sound.stationId)).toBe(16);
  expect(await countOf('dirty_marks', sound.stationId)).toBe(0);
  expect(await countOf('dirty_marks', bad.stationId)).toBeGreaterThan(0);
  expect(await troubles()).toEqual(stationTrouble('aggregate'));
  // It rests: the next round finds nothing to do rather than the same failure.
  expect(await aggregate()).toBe(0);
  expect(await listJobTroubles(bad.networkId)).toMatchObject([{ times: 1 }]);
  await cure();
  await inTransaction((transaction) => wakeJobTroubles(bad.networkId, new Date(), transaction));
  await aggregate();
  expect(await countOf('quarter_hours', bad.stationId)).toBe(16);
  expect(await troubles()).toEqual([]);
});

test('trace-days: the days of other stations are made', async () => {
  await measuredAtBoth();
  await aggregate();
  await poison();
  await traceDays(new Date());
  const waiting = await db()('station_day_traces').where({ is_waiting: 1 }).pluck('station_id');
  expect(waiting).toEqual([bad.stationId]);
  expect(await troubles()).toEqual(stationTrouble('trace-days'));
});

test('judge-limits: windows of other limits and stations are judged', async () => {
  const limits: number[] = [];
  for (const { networkId } of [bad, sound]) {
    const [limitId] = await db()('limits').insert({ network_id: networkId, created_at: new Date() });
    limits.push(Number(limitId));
    await db()('limit_versions').insert(await versionOf(Number(limitId)));
  }
  await measuredAtBoth();
  await aggregate();
  expect(await db()('pending_windows').distinct().pluck('limit_id')).toHaveLength(2);
  await db()('quarter_hours')
    .where({ station_id: bad.stationId })
    .update({ a_classes: Buffer.from([255]) });
  await db()('quarter_hours').where({ station_id: bad.stationId }).update({ a_energy_sec: -1 });
  await db()('limit_versions').where({ limit_id: limits[0] }).update({ station_ids: '{"not": "a list"}' });
  while ((await judgeLimits(new Date())) > 0);
  expect(await countOf('pending_windows', sound.stationId)).toBe(0);
  expect(await db()('exceedances').where({ station_id: sound.stationId })).toHaveLength(16);
  expect(await countOf('pending_windows', bad.stationId)).toBeGreaterThan(0);
  expect(await troubles()).toEqual([
    {
      job: 'judge-limits',
      subject: `limit ${limits[0]} at station ${bad.stationId}`,
      networkId: bad.networkId,
    },
  ]);
});

async function versionOf(limitId: number) {
  return {
    limit_id: limitId,
    version: 1,
    effective_from: 0,
    name: 'Low',
    metric: 'LAeq',
    averaging: '15min',
    threshold_tenths: 10,
    weekdays: 127,
    minimum_coverage: 0,
    recipients: '[]',
    reason: '',
    created_at: new Date(),
  };
}

test('import-files: a file that fails unforeseen lets the next one be checked', async () => {
  const ids: number[] = [];
  for (const { networkId, stationId } of [bad, sound]) {
    const [id] = await db()('imports').insert({
      network_id: networkId,
      station_id: stationId,
      state: 'checking',
      file_key: '00000000-0000-4000-8000-000000000000',
      file_name: 'card.csv',
      file_bytes: 10,
      file_digest: Buffer.alloc(32),
      mapping:
        networkId === bad.networkId ? 'not JSON' : '{"delimiter":",","decimal":".","columns":["start"]}',
      created_by: '-',
      created_at: new Date(),
      report: '{}',
    });
    ids.push(Number(id));
  }
  await importFiles();
  await importFiles();
  expect(await troubles()).toMatchObject([{ job: 'import-files', subject: `import ${ids[0]}` }]);
  // Its file is gone, which is told of an import itself.
  expect(await db()('imports').where({ id: ids[1] }).first('state')).toEqual({ state: 'failed' });
});

test('shift-clocks: a shift of a station that is gone lets the next one be made', async () => {
  const ids: number[] = [];
  for (const [stationId, networkId] of [
    [4_000_000, bad.networkId],
    [sound.stationId, sound.networkId],
  ]) {
    const [id] = await db()('clock_shifts').insert({
      network_id: networkId,
      station_id: stationId,
      from_sec: STRETCH.fromSec,
      to_sec: STRETCH.toSec,
      shift_sec: -3600,
      reason: 'A trial.',
      state: 'moving',
      planned_count: 0,
      created_by: '-',
      created_at: new Date(),
    });
    ids.push(Number(id));
  }
  for (let round = 0; round < 4; round += 1) await shiftClocks();
  expect(await db()('clock_shifts').where({ id: ids[1] }).first('state')).toEqual({ state: 'moved' });
});

test('compose-alerts: a recipient whose message cannot be composed lets the next one have theirs', async () => {
  const words = {
    station: 'ST-1 Quay',
    headline: 'above the limit by 2.3 dB',
    because: null,
    facts: [['Limit', 'Low']],
    exceedanceUrl: 'http://127.0.0.1/e',
    stripUrl: 'http://127.0.0.1/s',
    isStanding: true,
  };
  const due = (networkId: number, recipient: string, given: unknown, minutes: number) => ({
    network_id: networkId,
    recipient,
    exceedance_id: 1,
    item_key: 'k',
    words: JSON.stringify(given),
    due_at: new Date(Date.now() - minutes * 60_000),
    created_at: new Date(),
  });
  await db()('alert_items').insert([
    due(bad.networkId, 'first@people.example', null, 9),
    due(sound.networkId, 'second@people.example', words, 5),
  ]);
  await composeAlerts(new Date());
  await composeAlerts(new Date());
  const [trouble] = await listJobTroubles(null);
  expect(trouble).toMatchObject({ job: 'compose-alerts', networkId: bad.networkId });
  expect(JSON.stringify(trouble)).not.toContain('first@');
  expect(await db()('outbox').pluck('recipient')).toEqual(['second@people.example']);
});

test('send-mail: a message of which nothing is known fails by itself, and the next one goes', async () => {
  const sent: string[] = [];
  for (const [key, recipient] of [
    ['odd', null],
    ['even', 'even@people.example'],
  ] as const) {
    const mail = {
      messageId: messageIdOf(key),
      dedupeKey: key,
      networkId: sound.networkId,
      kind: 'unheard-of',
    };
    await inTransaction((transaction) =>
      insertMail({ ...mail, recipient: recipient ?? '', subject: key, text: 't', html: 'h' }, transaction),
    );
    if (recipient === null) await db()('outbox').where({ dedupe_key: key }).update({ recipient: null });
  }
  const transport = { sendMail: async ({ subject }: { subject?: string }) => void sent.push(subject ?? '') };
  const settings = { transport: transport as never, from: 'b@merrow.example', holder: 'h', resolvers: {} };
  while ((await sendDueMail(settings, new Date())) > 0);
  expect(sent).toEqual(['even']);
  const [odd] = await db()('outbox').where({ dedupe_key: 'odd' });
  expect(odd).toMatchObject({ state: 'waiting', attempts: 1 });
  expect(odd.last_error).toBeTruthy();
});

test('send-webhooks: a receiver that cannot be posted to lets the next one have its events', async () => {
  for (const [url, networkId] of [
    ['not an address', bad.networkId],
    ['http://127.0.0.1:9/', sound.networkId],
  ] as const) {
    const [id] = await db()('webhooks').insert({
      network_id: networkId,
      url,
      salt: Buffer.alloc(16),
      created_by: '-',
      created_at: new Date(),
      next_attempt_at: new Date(Date.now() - 1000),
    });
    await db()('webhook_deliveries').insert({
      webhook_id: id,
      event_id: '00000000-0000-4000-8000-000000000000',
      event: 'exceedance',
      event_key: 'k',
      body: '{}',
      created_at: new Date(),
    });
  }
  const sender = { holder: 'h', mayLoopBack: true };
  for (let round = 0; round < 3; round += 1) await sendDueWebhook(sender, new Date());
  const attempts = await db()('webhook_deliveries').orderBy('id').pluck('attempts');
  expect(attempts[1]).toBe(1);
  // Tried and told in the list of deliveries.
  expect(attempts[0]).toBe(1);
});

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
];

/** These cannot but fail in such a network. */
const NEED_THE_ZONE = new Set(['draft-summaries', 'remind-calibrations', 'remind-complaints']);

test.each(OF_NETWORKS)('%s: a network with unreadable settings does not end the round', async (job, run) => {
  await measuredAtBoth();
  await aggregate();
  await poison();
  const { userId } = await makePerson(bad.networkId, ['operator']);
  await db()('alert_preferences').insert({
    network_id: bad.networkId,
    user_id: userId,
    delivery: 'at-once',
    daily_at_min: 0,
    group_min: 0,
    warns_early: 1,
    changed_at: new Date(),
  });
  await db()('network_settings').where({ network_id: bad.networkId }).update({ time_zone: 'Nowhere/None' });
  await run(new Date());
  const noted = await troubles();
  for (const one of noted) expect(one).toMatchObject({ job, networkId: bad.networkId });
  if (job === 'watch-health') expect(await countOf('health_troubles', sound.stationId)).toBeGreaterThan(0);
  if (NEED_THE_ZONE.has(job)) expect(noted).toHaveLength(1);
});
