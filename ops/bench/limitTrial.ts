import { db } from '#db/client';
import { inTransaction, pool } from '#db/queries/connection';
import { listSettings } from '#db/queries/networks';
import { insertQuarterHours } from '#db/queries/quarterHours';
import type { StationRow } from '#db/queries/stations';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { tryRule, type TrialRule } from '#lib/services/limitTrial/tryRule';
import { QUARTER_SEC } from '#lib/time/quarters';
import { compare, digits, median, printTable } from './support/measure';
import { FIRST_SEC } from './support/months';
import { withOwnSchema } from './support/schema';
import { BANDS, makeNetwork, makeStation } from './support/station';

/** Limits tried on a year of quarter-hours of eight stations, against the same trial on one station. */
const STATIONS = 8;
const YEAR_SEC = 365 * 86_400;
const ALWAYS = {
  weekdays: 127,
  fromMin: null,
  toMin: null,
  minimumCoverage: null,
  stationIds: null,
} as const;
const A_WEIGHTED = { ...ALWAYS, bandFraction: null, bandIndex: null, thresholdTenths: 600 } as const;
const RULES: [name: string, rule: TrialRule][] = [
  ['LAeq,15 min', { ...A_WEIGHTED, metric: 'LAeq', averaging: '15min' }],
  ['Lnight', { ...A_WEIGHTED, metric: 'LAeq', averaging: 'night' }],
  [
    'Leq,1 h of the 100 Hz third',
    { ...A_WEIGHTED, metric: 'bandLeq', averaging: '1h', bandFraction: 3, bandIndex: -10 },
  ],
];

await withOwnSchema(async () => {
  const networkId = await makeNetwork();
  const stations: StationRow[] = [];
  for (let number = 1; number <= STATIONS; number += 1) {
    const station = await makeStation(networkId, `TRIAL-${number}`, 60);
    await fillYear(station.id);
    stations.push(station);
  }
  const timeline = await listSettings(networkId);
  const period = { fromSec: FIRST_SEC, toSec: FIRST_SEC + YEAR_SEC };
  const ground = { stations, timeline, period, nowSec: period.toSec };
  const rows: string[][] = [];
  for (const [name, rule] of RULES) {
    let caught = 0;
    let cpuMs = NaN;
    const { ms, againstMs } = await compare(
      1,
      async () => {
        const before = process.cpuUsage();
        const tried = await tryRule(rule, ground, pool());
        const { user, system } = process.cpuUsage(before);
        cpuMs = (user + system) / 1000;
        caught = tried.reduce((sum, { counts }) => sum + counts.caught, 0);
      },
      () => tryRule(rule, { ...ground, stations: stations.slice(0, 1) }, pool()),
    );
    rows.push([
      name,
      digits(median(ms) / median(againstMs)),
      digits(cpuMs),
      digits(median(ms)),
      String(caught),
    ]);
  }
  printTable(['a year of 8 stations', '8 stations ÷ 1', 'processor ms', 'ms', 'caught'], rows);
});

/** A day of quarter-hours that rise and fall, repeated to a year. */
async function fillYear(stationId: number): Promise<void> {
  const starts = Array.from({ length: 96 }, (_, at) => FIRST_SEC + at * QUARTER_SEC);
  const day = starts.map((startSec, at) => ({
    startSec,
    sums: sumsAt(Math.round(5500 + 900 * Math.sin(at / 9))),
    flagBits: 0,
    reasonBits: 0,
    lateSec: 0,
  }));
  await inTransaction((transaction) => insertQuarterHours(stationId, day, transaction));
  const [columns] = await db().raw('SHOW COLUMNS FROM quarter_hours');
  const names = (columns as { Field: string }[]).map(({ Field }) => Field);
  const cells = names.map((name) => (name === 'starts_at' ? 'starts_at + 86400 * seq' : name));
  await db().raw(
    `INSERT INTO quarter_hours (${names.join(', ')}) SELECT ${cells.join(', ')} FROM quarter_hours
     JOIN seq_1_to_364 WHERE station_id = ?`,
    [stationId],
  );
}

function sumsAt(laeqCentiDb: number) {
  const levels = new PeriodAccumulator();
  for (let minute = 0; minute < 15; minute += 1) {
    const interval = {
      durationSec: 60,
      sampleSec: 60,
      laeqCentiDb: laeqCentiDb + 40 * minute,
      lafmaxCentiDb: laeqCentiDb + 900,
      lafminCentiDb: laeqCentiDb - 600,
      lceqCentiDb: laeqCentiDb + 800,
      lcpeakCentiDb: null,
      bandFraction: 3 as const,
      levelsCentiDb: Int16Array.from(BANDS, ({ index }) => laeqCentiDb - 900 - 30 * index),
      bandIndices: Int8Array.from(BANDS, ({ index }) => index),
    };
    levels.add(interval, true);
  }
  return levels.sums;
}
