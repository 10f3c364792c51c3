import { expect, test } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { listJobTroubles, wakeJobTroubles } from '#db/queries/jobTroubles';
import { insertMail } from '#db/queries/outbox';
import { messageIdOf } from '#lib/services/mails/messageId';
import { sendDueMail } from '#ingest/notify/sendOutbox';
import { sendDueWebhook } from '#ingest/notify/sendWebhooks';
import { aggregate } from '#ingest/jobs/aggregate';
import { composeAlerts } from '#ingest/jobs/composeAlerts';
import { importFiles } from '#ingest/jobs/importFiles';
import { judgeLimits } from '#ingest/jobs/judgeLimits';
import { shiftClocks } from '#ingest/jobs/shiftClocks';
import { traceDays } from '#ingest/jobs/traceDays';
import { useFreshSchema } from '../integration/support/freshSchema';
import {
  countOf,
  measuredAtBoth,
  poison,
  stationTrouble,
  STRETCH,
  troubles,
  useTwoPlaces,
} from './support/twoPlaces';

/** A record that cannot be worked at, in each job's input: it alone waits, is shown, and everything beside it is done. */
useFreshSchema();
const places = useTwoPlaces();

test('aggregate: a station with an unreadable interval rests, and is current once it is mended', async () => {
  await measuredAtBoth(places);
  const { cure } = await poison(places);
  await aggregate();
  expect(await countOf('quarter_hours', places.sound.stationId)).toBe(16);
  expect(await countOf('dirty_marks', places.sound.stationId)).toBe(0);
  expect(await countOf('dirty_marks', places.bad.stationId)).toBeGreaterThan(0);
  expect(await troubles()).toEqual(stationTrouble(places, 'aggregate'));
  // It rests: the next round finds nothing to do rather than the same failure.
  expect(await aggregate()).toBe(0);
  expect(await listJobTroubles(places.bad.networkId)).toMatchObject([{ times: 1 }]);
  await cure();
  await inTransaction((transaction) => wakeJobTroubles(places.bad.networkId, new Date(), transaction));
  await aggregate();
  expect(await countOf('quarter_hours', places.bad.stationId)).toBe(16);
  expect(await troubles()).toEqual([]);
});

test('trace-days: the days of other stations are made', async () => {
  await measuredAtBoth(places);
  await aggregate();
  await poison(places);
  await traceDays(new Date());
  const waiting = await db()('station_day_traces').where({ is_waiting: 1 }).pluck('station_id');
  expect(waiting).toEqual([places.bad.stationId]);
  expect(await troubles()).toEqual(stationTrouble(places, 'trace-days'));
});

test('judge-limits: windows of other limits and stations are judged', async () => {
  const limits: number[] = [];
  for (const { networkId } of [places.bad, places.sound]) {
    const [limitId] = await db()('limits').insert({ network_id: networkId, created_at: new Date() });
    limits.push(Number(limitId));
    await db()('limit_versions').insert(await versionOf(Number(limitId)));
  }
  await measuredAtBoth(places);
  await aggregate();
  expect(await db()('pending_windows').distinct().pluck('limit_id')).toHaveLength(2);
  await db()('quarter_hours')
    .where({ station_id: places.bad.stationId })
    .update({ a_classes: Buffer.from([255]) });
  await db()('quarter_hours').where({ station_id: places.bad.stationId }).update({ a_energy_sec: -1 });
  await db()('limit_versions').where({ limit_id: limits[0] }).update({ station_ids: '{"not": "a list"}' });
  while ((await judgeLimits(new Date())) > 0);
  expect(await countOf('pending_windows', places.sound.stationId)).toBe(0);
  expect(await db()('exceedances').where({ station_id: places.sound.stationId })).toHaveLength(16);
  expect(await countOf('pending_windows', places.bad.stationId)).toBeGreaterThan(0);
  expect(await troubles()).toEqual([
    {
      job: 'judge-limits',
      subject: `limit ${limits[0]} at station ${places.bad.stationId}`,
      networkId: places.bad.networkId,
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
  for (const { networkId, stationId } of [places.bad, places.sound]) {
    const [id] = await db()('imports').insert({
      network_id: networkId,
      station_id: stationId,
      state: 'checking',
      file_key: '00000000-0000-4000-8000-000000000000',
      file_name: 'card.csv',
      file_bytes: 10,
      file_digest: Buffer.alloc(32),
      mapping:
        networkId === places.bad.networkId
          ? 'not JSON'
          : '{"delimiter":",","decimal":".","columns":["start"]}',
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
    [4_000_000, places.bad.networkId],
    [places.sound.stationId, places.sound.networkId],
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
    due(places.bad.networkId, 'first@people.example', null, 9),
    due(places.sound.networkId, 'second@people.example', words, 5),
  ]);
  await composeAlerts(new Date());
  await composeAlerts(new Date());
  const [trouble] = await listJobTroubles(null);
  expect(trouble).toMatchObject({ job: 'compose-alerts', networkId: places.bad.networkId });
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
      networkId: places.sound.networkId,
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
    ['not an address', places.bad.networkId],
    ['http://127.0.0.1:9/', places.sound.networkId],
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
