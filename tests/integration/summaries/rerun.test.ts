import { createHash } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test, vi } from 'vitest';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { sealStation } from '#db/queries/retention';
import { listIssued, type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { rerunMonth } from '#lib/services/summaries/life/rerun';
import { forgetKept } from '#lib/services/retention/kept';
import { signingKey, signWith } from '#lib/services/summaries/seal/keys';
import { rerunWords } from '#ops/summaries/rerunWords';
import { at, storeMinutes } from '../complaints/support';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { issue, network, storeMarch } from './lifeSupport';

const dataDir = mkdtempSync(join(tmpdir(), 'bittern-rerun-'));
process.env['BITTERN_DATA_DIR'] = dataDir;
useFreshSchema();
vi.setConfig({ testTimeout: 240_000 });

let quay: number;
let issued: IssuedSummaryRow;

beforeAll(async () => {
  const networkId = await makeNetwork('merrow');
  quay = await makeStation(networkId, 'MER-01');
  await db()('stations').update({ created_at: new Date('2026-01-01T00:00:00Z') });
  await storeMinutes(quay, at('2026-02-27T00:00:00Z'), at('2026-03-01T07:00:00Z'), () => ({
    laeqCentiDb: 5100,
  }));
  await storeMarch(quay, 5200);
  await aggregateAll(async () => {});
  await issue((await makePerson(networkId, ['operator'])).userId);
  [issued = await Promise.reject(new Error('Nothing was issued.'))] = await listIssued(networkId);
}, 240_000);

afterAll(() => {
  rmSync(dataDir, { recursive: true, force: true });
});

const rerun = async () => rerunWords(issued, await rerunMonth(await network(), issued));
const minute = (start: string) => db()('interval_levels').where({ station_id: quay, starts_at: at(start) });

test('a month from its intervals, past every stored sum, has the figures that were sealed', async () => {
  expect(await rerun()).toEqual({
    isSame: true,
    lines: [
      '2026-03, revision 1: manifest and signature hold.',
      'Every figure that was compared is the same.',
    ],
  });
  // The hours of the clock change are among them.
  expect(await db()('dirty_marks').count({ count: '*' }).first()).toEqual({ count: 0 });
});

test('what was changed in the stored sums alone does not hide what the intervals say', async () => {
  const ofMonth = () =>
    db()('quarter_hours').where({ station_id: quay }).where('starts_at', '>=', at('2026-03-01T00:00:00Z'));
  await ofMonth().update({ a_energy_sec: db().raw('a_energy_sec * 2') });
  expect((await rerun()).isSame).toBe(true);
  await ofMonth().update({ a_energy_sec: db().raw('a_energy_sec / 2') });
});

test('one changed bit of one interval is told, also where no figure shows it', async () => {
  const row = await minute('2026-03-20T12:34:00Z').first('laeq_centi_db', 'battery_centi_v');
  await minute('2026-03-20T12:34:00Z').update({ laeq_centi_db: row.laeq_centi_db ^ 64 });
  const changed = await rerun();
  expect(changed.isSame).toBe(false);
  expect(changed.lines).toContain('CHANGED  intervals of MER-01 are not those that were sealed.');
  expect(changed.lines.some((line) => line.startsWith('DIFFERS  MER-01 days 2026-03-20 Lday'))).toBe(true);
  expect(changed.lines.some((line) => line.includes('days 2026-03-25'))).toBe(false);
  await minute('2026-03-20T12:34:00Z').update({ laeq_centi_db: row.laeq_centi_db, battery_centi_v: 1 });
  expect((await rerun()).lines.slice(1)).toEqual([
    'CHANGED  intervals of MER-01 are not those that were sealed.',
    '0 figures differ.',
  ]);
  await minute('2026-03-20T12:34:00Z').update({ battery_centi_v: row.battery_centi_v });
  expect((await rerun()).isSame).toBe(true);
});

test('what the year to date rests on before the month is sealed, too', async () => {
  const manifest = JSON.parse(issued.manifest);
  expect(manifest.data.year).toMatchObject({
    from: '2026-01-01T00:00:00Z',
    to: '2026-03-01T00:00:00Z',
    stations: [{ code: 'MER-01', months: [{ month: '2026-02', hours: 48, periods: 7 }] }],
  });
  const february = () =>
    db()('quarter_hours').where({ station_id: quay, starts_at: at('2026-02-28T12:00:00Z') });
  await february().update({ a_energy_sec: db().raw('a_energy_sec * 2') });
  expect((await rerun()).lines).toContain(
    'CHANGED  sums of MER-01 in 2026-02, which the year to date rests on, are not those that were sealed.',
  );
  await february().update({ a_energy_sec: db().raw('a_energy_sec / 2') });
  expect((await rerun()).isSame).toBe(true);
});

test('a month that was issued before that was told is computed again as ever, and it says what is not sealed', async () => {
  const manifest = JSON.parse(issued.manifest);
  delete manifest.data.year;
  const text = `${JSON.stringify(manifest, null, 2)}\n`;
  const older = {
    ...issued,
    manifest: text,
    manifestSha256: createHash('sha256').update(text).digest(),
    signature: signWith(await signingKey((await network()).id), text),
  };
  const { isSame, lines } = rerunWords(older, await rerunMonth(await network(), older));
  expect([isSame, lines[1]]).toEqual([
    true,
    'NOTE     nothing was sealed of the months before, which the year to date rests on.',
  ]);
});

test('where only a part of the intervals is kept, the sealed sums tell of the whole month', async () => {
  const keptFromSec = at('2026-03-15T00:00:00Z');
  const seal = { sealedBeforeSec: at('2026-03-17T00:00:00Z'), keptFromSec };
  await inTransaction((transaction) => sealStation(quay, seal, new Date(), transaction));
  forgetKept();
  await db()('interval_levels').where({ station_id: quay }).where('starts_at', '<', keptFromSec).delete();
  const { isSame, lines } = await rerun();
  expect(lines.filter((line) => /^(CHANGED|DIFFERS)/.test(line))).toEqual([]);
  expect(isSame).toBe(true);
  expect(lines[1]).toMatch(/^NOTE {5}intervals of MER-01 are not kept any more/);
});

test('where the intervals are not kept any more, the stored sums tell, and it says so', async () => {
  const keptFromSec = at('2026-04-29T00:00:00Z');
  await db()('sealed_stations')
    .insert({
      station_id: quay,
      sealed_before: keptFromSec + 2 * 86_400,
      kept_from: keptFromSec,
      sealed_at: new Date(),
    })
    .onConflict(['station_id'])
    .merge();
  forgetKept();
  await db()('interval_levels').where({ station_id: quay }).delete();
  const { isSame, lines } = await rerun();
  expect(isSame).toBe(true);
  expect(lines.slice(1)).toEqual([
    'NOTE     intervals of MER-01 are not kept any more; its figures come from the sealed sums of its quarter-hours and days.',
    expect.stringMatching(
      /^NOTE {5}\d+ of their figures, those that only intervals tell and those by the clock, cannot be compared any more\.$/,
    ),
    'Every figure that was compared is the same.',
  ]);
  await db()('day_periods')
    .where({ station_id: quay, local_date: '2026-03-20', period: 'day' })
    .update({
      a_energy_sec: db().raw('a_energy_sec * 2'),
    });
  await db()('quarter_hours')
    .where({ station_id: quay })
    .whereBetween('starts_at', [at('2026-03-20T08:00:00Z'), at('2026-03-20T12:00:00Z')])
    .update({ a_energy_sec: db().raw('a_energy_sec * 2') });
  const changed = await rerun();
  expect(changed.isSame).toBe(false);
  expect(changed.lines.some((line) => line.startsWith('DIFFERS  MER-01 days 2026-03-20 Lday'))).toBe(true);
});
