import type { BandFraction } from '#lib/acoustics/bands';
import { bandSetById } from './bandSets';
import { type Connection } from './connection';
import { packLevelsHex, unpackAll } from './intervalPacking';

/** One interval as stored: levels in hundredths of a dB, times in epoch seconds UTC. */
export interface StoredInterval {
  startSec: number;
  durationSec: number;
  laeqCentiDb: number;
  lafmaxCentiDb: number | null;
  lafminCentiDb: number | null;
  lceqCentiDb: number | null;
  lcpeakCentiDb: number | null;
  bandSetId: number;
  bandFraction: BandFraction;
  /** Absolute band indices; intervals of one band set share the array. */
  bandIndices: Int8Array;
  /** Unweighted band levels beside `bandIndices`; −32768 = none. */
  levelsCentiDb: Int16Array;
  flags: number;
  windSpeedMs: number | null;
  windDirectionDeg: number | null;
  temperatureC: number | null;
  batteryV: number | null;
  receivedAtSec: number;
}

/** What levels and their validity are taken from: an interval without what only lists of intervals show. */
export type MeasuredInterval = Omit<StoredInterval, 'temperatureC' | 'batteryV'>;

/** Columns of an interval that is measured with, in the order of `MeasuredCells`. */
export const MEASURED_COLUMNS = `starts_at, duration_sec, laeq_centi_db, lafmax_centi_db, lafmin_centi_db, lceq_centi_db, lcpeak_centi_db,
  band_set_id, band_levels_centi_db, flags, wind_speed_centi_ms, wind_direction_deg, received_at`;

/** Columns of an interval's row, in the order of `IntervalCells`. */
export const INTERVAL_COLUMNS = `${MEASURED_COLUMNS}, temperature_centi_c, battery_centi_v`;

/** A row of `MEASURED_COLUMNS` as the driver gives it. */
export type MeasuredCells = [
  startSec: number,
  durationSec: number,
  laeqCentiDb: number,
  lafmaxCentiDb: number | null,
  lafminCentiDb: number | null,
  lceqCentiDb: number | null,
  lcpeakCentiDb: number | null,
  bandSetId: number,
  levels: Buffer,
  flags: number,
  windSpeedCentiMs: number | null,
  windDirectionDeg: number | null,
  receivedAtSec: number,
];

/** A row of `INTERVAL_COLUMNS` as the driver gives it. */
export type IntervalCells = [
  ...MeasuredCells,
  temperatureCentiC: number | null,
  batteryCentiV: number | null,
];

const NO_LEVELS = new Int16Array(0);

/** Intervals of rows, without what only lists of intervals show. */
export async function measuredOfCells(
  rows: readonly (MeasuredCells | IntervalCells)[],
  conn: Connection,
): Promise<MeasuredInterval[]> {
  const intervals: MeasuredInterval[] = [];
  let set = rows[0] && (await bandSetById(rows[0][7], conn));
  const levels = unpackAll(rows.map((row) => row[8]));
  for (const [at, row] of rows.entries()) {
    if (set?.id !== row[7]) set = await bandSetById(row[7], conn);
    intervals.push({
      startSec: row[0],
      durationSec: row[1],
      laeqCentiDb: row[2],
      lafmaxCentiDb: row[3],
      lafminCentiDb: row[4],
      lceqCentiDb: row[5],
      lcpeakCentiDb: row[6],
      bandSetId: set.id,
      bandFraction: set.fraction,
      bandIndices: set.indices,
      levelsCentiDb: levels[at] ?? NO_LEVELS,
      flags: row[9],
      windSpeedMs: row[10] === null ? null : row[10] / 100,
      windDirectionDeg: row[11],
      receivedAtSec: row[12],
    });
  }
  return intervals;
}

/** Intervals of rows. */
export async function intervalsOfCells(
  rows: readonly IntervalCells[],
  conn: Connection,
): Promise<StoredInterval[]> {
  const measured = await measuredOfCells(rows, conn);
  return measured.map((interval, at) =>
    Object.assign(interval, {
      temperatureC: inWhole(rows[at]?.[13]),
      batteryV: inWhole(rows[at]?.[14]),
    }),
  );
}

const inWhole = (hundredthsOfIt: number | null | undefined): number | null =>
  hundredthsOfIt === null || hundredthsOfIt === undefined ? null : hundredthsOfIt / 100;

/** What a new row holds: an interval without what its band set tells. */
export type NewInterval = Omit<StoredInterval, 'bandFraction' | 'bandIndices'>;

/**
 * The cells of a row as SQL, in the order of `INTERVAL_COLUMNS`. Bindings, nearly ten thousand a statement, would cost more time than everything else that receiving does;
 * every cell is a number or hexadecimal digits, so there is nothing to escape.
 */
export function intervalCellsText(interval: NewInterval): string {
  const { startSec, durationSec, laeqCentiDb, lafmaxCentiDb, lafminCentiDb, lceqCentiDb, lcpeakCentiDb } =
    interval;
  const { windSpeedMs, windDirectionDeg, temperatureC, batteryV, bandSetId, flags, receivedAtSec } = interval;
  const levels = `${cell(lafmaxCentiDb)},${cell(lafminCentiDb)},${cell(lceqCentiDb)},${cell(lcpeakCentiDb)}`;
  const wind = `${hundredths(windSpeedMs)},${cell(windDirectionDeg)}`;
  const bands = `${bandSetId},x'${packLevelsHex(interval.levelsCentiDb)}'`;
  const listed = `${hundredths(temperatureC)},${hundredths(batteryV)}`;
  return `${startSec},${durationSec},${laeqCentiDb},${levels},${bands},${flags},${wind},${receivedAtSec},${listed}`;
}

const cell = (value: number | null): number | 'NULL' => value ?? 'NULL';

function hundredths(value: number | null): number | 'NULL' {
  return value === null ? 'NULL' : Math.round(value * 100);
}
