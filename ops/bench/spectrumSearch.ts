import { monitorEventLoopDelay } from 'node:perf_hooks';
import { deflateRawSync } from 'node:zlib';
import { db } from '#db/client';
import { inTransaction } from '#db/queries/connection';
import { selectShapes } from '#db/queries/dayTraces';
import { insertIntervals } from '#db/queries/intervals';
import { markMeasuredQuarters } from '#db/queries/quarterHours';
import { type StationRow } from '#db/queries/stations';
import { aggregateAll } from '#ingest/aggregate/aggregate';
import { makeTraces } from '#ingest/traces/makeTraces';
import { spectrumSearchOptionsSchema } from '#lib/contracts/spectrumSearch';
import { searchSpectrum } from '#lib/services/spectra/search';
import { digits, median, msOf, printTable } from './support/measure';
import { FIRST_SEC, fillMonth, MONTH_SEC } from './support/months';
import { withOwnSchema } from './support/schema';
import { invent, makeNetwork, makeStation } from './support/station';

/**
 * A spectrum looked for in a year of minutes of eight stations (31 thirds): target 2 s, aim 0.5 s; against a month of one station.
 * "Common" finds most of it; "near" finds nothing, and outlines rule out most days; "odd" has the slope the other way round, some 5 dB
 * off, so that nothing is found, but outlines rule out little. The days are a month's traces, repeated.
 */
const STATIONS = 8;
const MONTHS = 12;
const ROUNDS = 3;
const YEAR = { fromSec: FIRST_SEC, toSec: FIRST_SEC + 365 * 86_400 };

await withOwnSchema(async () => {
  const network = await makeNetwork();
  const station = await makeStation(network, 'STATION-1', 60);
  await fillMonth(station);
  const makeMs = await msOf(async () => {
    while ((await makeTraces(new Date((FIRST_SEC + 2 * MONTH_SEC) * 1000))) > 0);
  });
  await repeatTraces(station);
  const sizes = (await selectShapes(station.id, [FIRST_SEC]))[0]?.[1] ?? Buffer.alloc(0);
  console.log(
    `A day's trace: ${digits(makeMs / 30)} ms to make, ${sizes.length} bytes of shapes, ${deflateRawSync(sizes).length} deflated.`,
  );
  const rows: string[][] = [];
  const machine = await addMachine(network);
  for (const [what, of, mostRmsDb, stations, toSec] of [
    ['common, a year × 8', station, 3, STATIONS, YEAR.toSec],
    ['near, a year × 8', station, 1.2, STATIONS, YEAR.toSec],
    ['odd, a year × 8', machine, 3, STATIONS, YEAR.toSec],
    ['common, a year × 1', station, 3, 1, YEAR.toSec],
    ['common, a month × 1', station, 3, 1, FIRST_SEC + MONTH_SEC],
  ] as const) {
    rows.push([what, ...(await measure(of, { mostRmsDb, stations, toSec }))]);
  }
  printTable(
    [
      'search',
      'median s',
      'fastest s',
      'processor s',
      'longest wait of the web ms',
      'spells',
      'alike minutes',
      'resident MiB',
    ],
    rows,
  );
});

interface Measured {
  mostRmsDb: number;
  stations: number;
  toSec: number;
}

async function measure(station: StationRow, { mostRmsDb, stations, toSec }: Measured): Promise<string[]> {
  const search = () =>
    searchSpectrum({
      station,
      period: { fromSec: FIRST_SEC + 36_000, toSec: FIRST_SEC + 36_900 },
      searched: { fromSec: FIRST_SEC, toSec },
      codes: Array.from({ length: stations }, (_, at) => `STATION-${at + 1}`),
      options: spectrumSearchOptionsSchema.parse({ likeness: mostRmsDb }),
      nowSec: YEAR.toSec,
    });
  let answer = await search();
  const seconds: number[] = [];
  const before = process.cpuUsage();
  const delay = monitorEventLoopDelay({ resolution: 5 });
  delay.enable();
  for (let round = 0; round < ROUNDS; round += 1) {
    seconds.push((await msOf(async () => (answer = await search()))) / 1000);
  }
  delay.disable();
  const { user, system } = process.cpuUsage(before);
  const alike = answer.stations.reduce((sum, one) => sum + one.alikeMinutes, 0);
  return [
    digits(median(seconds)),
    digits(Math.min(...seconds)),
    digits((user + system) / 1e6 / ROUNDS),
    digits(delay.max / 1e6),
    String(answer.spellsFound),
    String(alike),
    digits(process.memoryUsage().rss / 1024 ** 2),
  ];
}

/** The first month's traces as those of a year, and of seven more stations. */
async function repeatTraces({ id, networkId }: StationRow): Promise<void> {
  const copy = (toId: number, shiftSec: number) =>
    db().raw(
      `INSERT IGNORE INTO station_day_traces (station_id, starts_at, outline, shapes, is_waiting)
       SELECT ?, starts_at + ?, outline, shapes, is_waiting FROM station_day_traces WHERE station_id = ? AND starts_at < ?`,
      [toId, shiftSec, id, FIRST_SEC + MONTH_SEC],
    );
  for (let month = 1; month <= MONTHS; month += 1) await copy(id, month * MONTH_SEC);
  for (let other = 2; other <= STATIONS; other += 1) {
    const { id: otherId } = await makeStation(networkId, `STATION-${other}`, 60);
    for (let month = 0; month <= MONTHS; month += 1) await copy(otherId, month * MONTH_SEC);
  }
}

/** A station that heard a quarter of an hour of another shape: the slope the other way round. */
async function addMachine(networkId: number): Promise<StationRow> {
  const station = await makeStation(networkId, 'MACHINE', 60);
  const heard = await invent(FIRST_SEC + 36_000, 15, 60);
  const reversed = heard.map((one) => ({ ...one, levelsCentiDb: one.levelsCentiDb.slice().reverse() }));
  await inTransaction((transaction) => insertIntervals(station.id, reversed, transaction));
  await inTransaction((transaction) => markMeasuredQuarters(station.id, transaction));
  await aggregateAll(async () => undefined);
  return station;
}
