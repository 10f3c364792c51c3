import { beforeAll, expect, test } from 'vitest';
import { db } from '#db/client';
import { type StoredInterval } from '#db/queries/intervals';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { makeTraces } from '#ingest/traces/makeTraces';
import { BAND_SLOTS, bandByNominalHz, bandSlot } from '#lib/acoustics/bands';
import { spectralLikeness } from '#lib/acoustics/likeness';
import { type SpectrumSearchAnswer } from '#lib/contracts/spectrumSearch';
import { findStationById } from '#db/queries/stations';
import { sameSpectrum } from '#lib/services/complaints/sameSpectrum';
import { addExclusion } from '#lib/services/exclusions/add';
import { invent, seededNoise, storeMeasured } from '../levels/support/measured';
import { callApi } from '../support/callApi';
import { useFreshSchema } from '../support/freshSchema';
import { makeNetwork, makePerson, makeStation } from '../support/people';
import { rebuildAll } from '../levels/support/rebuildAll';

useFreshSchema();

const sec = (text: string) => Date.parse(text) / 1000;
const nothing = async () => undefined;
const FIRST_SEC = sec('2026-03-02T00:00:00Z');
const DAYS = 10;
const MAY_MAKE = new Date('2026-06-01T00:00:00Z');
/** A machine of both stations: every weekday from 05:40 to 06:10 by the clock in London. */
const MACHINE = { fromMinute: 340, toMinute: 370 };

let networkId: number;
let userId: string;
let session: string;
const measured = new Map<string, StoredInterval[]>();
const ids = new Map<string, number>();

beforeAll(async () => {
  networkId = await makeNetwork('alike');
  const person = await makePerson(networkId, ['operator']);
  ({ userId, session } = person);
  for (const [code, seed] of [
    ['AL-1', 3],
    ['AL-2', 4],
  ] as const) {
    const stationId = await makeStation(networkId, code);
    ids.set(code, stationId);
    const span = { fromSec: FIRST_SEC, toSec: FIRST_SEC + DAYS * 86_400 };
    const heard = await invent({ ...span, intervalSec: 60, bands: [-16, 10], gaps: 0 }, seed);
    const noise = seededNoise(seed + 100);
    const intervals = heard.map((interval) => withMachine(interval, noise));
    measured.set(code, intervals);
    await storeMeasured(stationId, intervals);
  }
  await aggregateAll(nothing);
});

/** Hum in two bands over a slope, in the machine's minutes; its loudness wanders. */
function withMachine(interval: StoredInterval, noise: () => number): StoredInterval {
  const minute = Math.floor((interval.startSec % 86_400) / 60);
  const weekday = new Date(interval.startSec * 1000).getUTCDay();
  if (minute < MACHINE.fromMinute || minute >= MACHINE.toMinute || weekday === 0 || weekday === 6)
    return interval;
  const loudness = 4500 + Math.round(noise() * 1500);
  const levelsCentiDb = Int16Array.from(interval.bandIndices, (index) =>
    Math.round(loudness - 60 * index + (index === -10 || index === -7 ? 1500 : 0) + noise() * 200),
  );
  return { ...interval, laeqCentiDb: loudness, levelsCentiDb, flags: 0, windSpeedMs: null };
}

async function search(query: Record<string, string> = {}): Promise<SpectrumSearchAnswer> {
  const all = new URLSearchParams({
    station: 'AL-1',
    from: '2026-03-04T05:40:00Z',
    to: '2026-03-04T06:10:00Z',
    since: '2026-03-01T00:00:00Z',
    until: '2026-03-15T00:00:00Z',
    ...query,
  });
  const answer = await callApi('GET', `/api/v1/networks/alike/spectrum-search?${all}`, { session });
  const told = await answer.json();
  expect(answer.status, JSON.stringify(told)).toBe(200);
  return told;
}

const told = ({ spells, pattern, stations, spellsFound }: SpectrumSearchAnswer) => ({
  spells,
  pattern,
  stations,
  spellsFound,
});

let first: SpectrumSearchAnswer;

test('days that wait for their traces are made from intervals; traces then answer the same', async () => {
  first = await search({ likeness: '1.5' });
  expect(first.state).toBe('searched');
  expect(first.isComplete).toBe(true);
  // Eight weekdays at each station, without the one that is asked about.
  expect(first.spellsFound).toBe(15);
  expect(first.pattern.words).toBe('Mostly weekdays 05:40–06:10, at Station AL-2 too.');
  expect(first.stations.map(({ days }) => days)).toEqual([DAYS, DAYS]);
  while ((await makeTraces(MAY_MAKE, { mostDays: 7 })) > 0);
  const [counted] = await db()('station_day_traces').where({ is_waiting: 1 }).count({ waiting: '*' });
  expect(Number(counted?.waiting)).toBe(0);
  expect(told(await search({ likeness: '1.5' }))).toEqual(told(first));
});

test('is what brute force over the intervals finds, within the quarter decibel of the traces', async () => {
  const answer = await search({ likeness: '4', gap: '0' });
  const asked = new Array<number | null>(BAND_SLOTS).fill(null);
  for (const { nominalHz, Leq } of answer.asked.bands) {
    const band = bandByNominalHz(3, nominalHz);
    if (band) asked[bandSlot(band.index)] = Leq;
  }
  let surely = 0;
  let perhaps = 0;
  for (const intervals of measured.values()) {
    for (const interval of intervals) {
      if (!isValid(interval) || isAsked(interval, intervals)) continue;
      const levels = new Array<number | null>(BAND_SLOTS).fill(null);
      interval.bandIndices.forEach((index, at) => {
        const centiDb = interval.levelsCentiDb[at] ?? -32768;
        if (centiDb !== -32768) levels[bandSlot(index)] = centiDb / 100;
      });
      const rmsDb = spectralLikeness(asked, levels)?.rmsDb ?? Infinity;
      if (rmsDb <= 3.75) surely += 1;
      if (rmsDb <= 4.25) perhaps += 1;
    }
  }
  const found = answer.stations.reduce((sum, { alikeMinutes }) => sum + alikeMinutes, 0);
  expect(found).toBeGreaterThanOrEqual(surely);
  expect(found).toBeLessThanOrEqual(perhaps);
  expect(surely).toBeGreaterThan(400);
});

/** Flags other than underrange and rain, and wind above 5 m/s, leave out; the invented flags are of one bit. */
function isValid({ flags, windSpeedMs }: StoredInterval): boolean {
  return (flags & ~0b110) === 0 && !(windSpeedMs !== null && windSpeedMs > 5);
}

function isAsked({ startSec }: StoredInterval, intervals: StoredInterval[]): boolean {
  const isFirst = intervals === measured.get('AL-1');
  return isFirst && startSec >= sec('2026-03-04T05:40:00Z') && startSec < sec('2026-03-04T06:10:00Z');
}

test('never stale: an exclusion counts at once, before and after the worker saw it', async () => {
  const span = { fromSec: sec('2026-03-05T05:00:00Z'), toSec: sec('2026-03-05T07:00:00Z') };
  const reason = 'Scaffolding at the mast';
  await addExclusion({ networkId, stationCode: 'AL-1', ...span, reason, userId });
  const before = await search({ likeness: '1.5' });
  expect(before.spellsFound).toBe(14);
  await aggregateAll(nothing);
  expect(told(await search({ likeness: '1.5' }))).toEqual(told(before));
  while ((await makeTraces(MAY_MAKE)) > 0);
  expect(told(await search({ likeness: '1.5' }))).toEqual(told(before));
  await rebuildAll(nothing);
  while ((await makeTraces(MAY_MAKE)) > 0);
  expect(told(await search({ likeness: '1.5' }))).toEqual(told(before));
});

test('stations, dates and level bound what is found', async () => {
  expect((await search({ likeness: '1.5', stations: 'AL-2' })).spellsFound).toBe(8);
  expect(
    (await search({ likeness: '1.5', stations: 'AL-2', since: '2026-03-09T00:00:00Z' })).spellsFound,
  ).toBe(3);
  const level = await search({ likeness: '1.5', within: '1' });
  const minutes = (answer: SpectrumSearchAnswer) =>
    answer.stations.reduce((sum, { alikeMinutes }) => sum + alikeMinutes, 0);
  expect(minutes(level)).toBeGreaterThan(0);
  expect(minutes(level)).toBeLessThan(minutes(first) / 2);
  expect((await search({ lowHz: '1000', highHz: '2000' })).state).toBe('too-few-bands');
});

test('as a file and as events with progress; wrong input is told', async () => {
  const query =
    'station=AL-1&from=2026-03-04T05:40:00Z&to=2026-03-04T06:10:00Z&since=2026-03-01T00:00:00Z&until=2026-03-15T00:00:00Z&likeness=1.5';
  const path = '/api/v1/networks/alike/spectrum-search';
  const file = await callApi('GET', `${path}.csv?${query}`, { session });
  expect((await file.text()).trim().split('\r\n')).toHaveLength(15);
  const events = await callApi('GET', `${path}?${query}`, {
    session,
    headers: { Accept: 'text/event-stream' },
  });
  const text = await events.text();
  expect(text).toMatch(/^event: progress\ndata: \{"done":\d+,"all":20\}/);
  expect(text).toContain('event: result\n');
  for (const [wrong, status] of [
    ['&likeness=none', 422],
    ['&stations=NOT-THERE', 404],
    ['&highHz=5', 422],
  ] as const) {
    expect((await callApi('GET', `${path}?${query}${wrong}`, { session })).status, wrong).toBe(status);
  }
});

test('evidence lists the most alike spells of other dates, and says where it could not look', async () => {
  const station = await findStationById(ids.get('AL-1') ?? NaN);
  if (!station) throw new Error('No station.');
  const question = {
    station,
    period: { fromSec: sec('2026-03-04T05:50:00Z'), toSec: sec('2026-03-04T06:00:00Z') },
    nowSec: sec('2026-03-20T00:00:00Z'),
  };
  const found = await sameSpectrum(question, { mostMs: 20_000 });
  expect(found).toMatchObject({ state: 'searched', why: null });
  expect(found.spells).toHaveLength(5);
  // The rest of the machine's half hour of that date is not another date.
  expect(found.spells.filter(({ from }) => from.startsWith('2026-03-04'))).toEqual([]);
  expect(found.spells.map(({ best }) => best)).toEqual(
    found.spells.map(({ best }) => best).sort((a, b) => a - b),
  );
  expect(await sameSpectrum(question, { mostMs: -1 })).toMatchObject({
    state: 'partly',
    spells: [],
    found: 0,
  });
  const silent = { ...question, period: { fromSec: FIRST_SEC - 7200, toSec: FIRST_SEC - 3600 } };
  expect(await sameSpectrum(silent)).toMatchObject({
    state: 'not-searched',
    why: 'The period has no valid data.',
  });
});
