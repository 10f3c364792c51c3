import { pool } from '#db/queries/connection';

/**
 * Figures of a period by another way than the product's: the database's own arithmetic on `interval_levels`, written from the
 * definitions (IEC 61672-1 and ISO 1996-1 for Leq; our own rules of validity, clipping and L_N as they are published).
 */

/** What is asked for; half-open, epoch seconds. */
export interface Asked {
  stationId: number;
  fromSec: number;
  toSec: number;
  /** Whether everything measured counts. */
  isAll?: boolean;
}

/** Calibration, selfcheck, overload, tamper, powerloss, clockset and wind, as bits of the stored flags. */
const LEFT_OUT_FLAGS = 4 | 8 | 1 | 64 | 128 | 256 | 32;

/**
 * Intervals that touch the period, with the seconds of them that lie within it, and whether they count. None lasts longer than
 * an hour: without that bound every question would read the station from its beginning.
 */
const TOUCHING = `
  SELECT i.*, s.fraction, s.band_indices,
    LEAST(i.starts_at + i.duration_sec, :toSec) - GREATEST(i.starts_at, :fromSec) AS sec,
    :isAll OR ((i.flags & ${LEFT_OUT_FLAGS}) = 0
      AND (i.wind_speed_centi_ms IS NULL OR i.wind_speed_centi_ms <= 500)
      AND NOT EXISTS (SELECT 1 FROM exclusions e WHERE e.station_id = i.station_id AND e.withdrawn_at IS NULL
        AND e.starts_at < i.starts_at + i.duration_sec AND e.ends_at > i.starts_at)) AS counts
  FROM interval_levels i JOIN band_sets s ON s.id = i.band_set_id
  WHERE i.station_id = :stationId AND i.starts_at > :fromSec - 3601 AND i.starts_at < :toSec AND i.starts_at + i.duration_sec > :fromSec`;

async function rowsOf<Row>(select: string, asked: Asked, more: Record<string, number> = {}): Promise<Row[]> {
  const [rows] = await pool().raw(`WITH touching AS (${TOUCHING}) ${select}`, {
    ...asked,
    isAll: asked.isAll ?? false,
    ...more,
  });
  return rows as Row[];
}

/** Broadband figures in dB and seconds. */
export interface Broadband {
  validSec: number;
  excludedSec: number;
  laeqDb: number | null;
  lceqDb: number | null;
  lafmaxDb: number | null;
  lafminDb: number | null;
  lcpeakDb: number | null;
  /** Length of the valid intervals, null when there are several lengths or none. */
  sampleSec: number | null;
}

type Cells = Record<Exclude<keyof Broadband, 'sampleSec'>, number | string | null> & {
  shortest: number | null;
  longest: number | null;
};

/** Broadband figures of a period. */
export async function broadband(asked: Asked): Promise<Broadband> {
  const [row] = await rowsOf<Cells>(
    `SELECT COALESCE(SUM(IF(counts, sec, 0)), 0) AS validSec, COALESCE(SUM(IF(counts, 0, sec)), 0) AS excludedSec,
       10 * LOG10(SUM(IF(counts, sec * POW(10, laeq_centi_db / 1000), 0)) / SUM(IF(counts, sec, 0))) AS laeqDb,
       10 * LOG10(SUM(IF(counts AND lceq_centi_db IS NOT NULL, sec * POW(10, lceq_centi_db / 1000), 0))
         / SUM(IF(counts AND lceq_centi_db IS NOT NULL, sec, 0))) AS lceqDb,
       MAX(IF(counts, lafmax_centi_db, NULL)) / 100 AS lafmaxDb, MIN(IF(counts, lafmin_centi_db, NULL)) / 100 AS lafminDb,
       MAX(IF(counts, lcpeak_centi_db, NULL)) / 100 AS lcpeakDb,
       MIN(IF(counts, duration_sec, NULL)) AS shortest, MAX(IF(counts, duration_sec, NULL)) AS longest
     FROM touching`,
    asked,
  );
  if (!row) throw new Error('The database gave no row of sums.');
  const { shortest, longest, ...cells } = row;
  return {
    validSec: Number(cells.validSec),
    excludedSec: Number(cells.excludedSec),
    laeqDb: numberOrNull(cells.laeqDb),
    lceqDb: numberOrNull(cells.lceqDb),
    lafmaxDb: numberOrNull(cells.lafmaxDb),
    lafminDb: numberOrNull(cells.lafminDb),
    lcpeakDb: numberOrNull(cells.lcpeakDb),
    sampleSec: shortest === longest ? shortest : null,
  };
}

function numberOrNull(cell: number | string | null): number | null {
  return cell === null ? null : Number(cell);
}

/** A base sample in tenths of a dB and its seconds in the period. */
export interface Sample {
  tenths: number;
  sec: number;
}

/** The base samples of LAeq, rounded half up to tenths. */
export async function laeqSamples(asked: Asked): Promise<Sample[]> {
  return rowsOf<{ tenths: number | string; sec: number | string }>(
    'SELECT FLOOR((laeq_centi_db + 5) / 10) AS tenths, sec FROM touching WHERE counts',
    asked,
  ).then(asSamples);
}

/** A stored level of a band: two bytes, little endian, two's complement. −32768 and a band that is not there are null. */
const BAND_CENTI_DB = (position: string) => {
  const unsigned = `(ASCII(SUBSTR(band_levels_centi_db, 2 * ${position} - 1, 1))
    + 256 * ASCII(SUBSTR(band_levels_centi_db, 2 * ${position}, 1)))`;
  return `IF(${position} = 0 OR ${unsigned} = 32768, NULL, CAST(${unsigned} AS SIGNED) - IF(${unsigned} > 32767, 65536, 0))`;
};
const THIRD = (offset: number) => BAND_CENTI_DB(`FIND_IN_SET(:index + ${offset}, band_indices)`);

/** Leq in dB of a band by its index (n of 1000·10^(n/10)), null where it has no level. */
export async function bandLeq(asked: Asked, index: number): Promise<number | null> {
  const [row] = await rowsOf<{ leqDb: number | null }>(
    `SELECT 10 * LOG10(SUM(sec * POW(10, centi_db / 1000)) / SUM(sec)) AS leqDb
     FROM (SELECT sec, ${THIRD(0)} AS centi_db FROM touching WHERE counts) AS band WHERE centi_db IS NOT NULL`,
    asked,
    { index },
  );
  return row?.leqDb ?? null;
}

/** The base samples of a band. */
export async function bandSamples(asked: Asked, index: number): Promise<Sample[]> {
  return rowsOf<{ tenths: number | string; sec: number | string }>(
    `SELECT FLOOR((centi_db + 5) / 10) AS tenths, sec
     FROM (SELECT sec, ${THIRD(0)} AS centi_db FROM touching WHERE counts) AS band WHERE centi_db IS NOT NULL`,
    asked,
    { index },
  ).then(asSamples);
}

/** The base samples of an octave of thirds: each interval's three thirds summed, where it has all three. */
export async function octaveSamples(asked: Asked, index: number): Promise<Sample[]> {
  return rowsOf<{ tenths: number | string; sec: number | string }>(
    `SELECT FLOOR(100 * LOG10(POW(10, low / 1000) + POW(10, middle / 1000) + POW(10, high / 1000)) + 0.5) AS tenths, sec
     FROM (SELECT sec, ${THIRD(-1)} AS low, ${THIRD(0)} AS middle, ${THIRD(1)} AS high
       FROM touching WHERE counts AND fraction = 3) AS thirds
     WHERE low IS NOT NULL AND middle IS NOT NULL AND high IS NOT NULL`,
    asked,
    { index },
  ).then(asSamples);
}

function asSamples(rows: { tenths: number | string; sec: number | string }[]): Sample[] {
  return rows.map(({ tenths, sec }) => ({ tenths: Number(tenths), sec: Number(sec) }));
}

/**
 * The smallest level that is exceeded for no more than N % of the time, by sorting; null with fewer than
 * 300/min(N, 100 − N) samples of `sampleSec`, or where there is no one length of samples.
 */
export function exceeded(
  samples: readonly Sample[],
  percent: number,
  sampleSec: number | null,
): number | null {
  const totalSec = samples.reduce((sum, { sec }) => sum + sec, 0);
  if (sampleSec === null || totalSec / sampleSec < 300 / Math.min(percent, 100 - percent)) return null;
  const rising = [...samples].sort((a, b) => a.tenths - b.tenths);
  let aboveSec = totalSec;
  for (let at = 0; at < rising.length; at += 1) {
    const { tenths, sec } = rising[at] ?? { tenths: NaN, sec: NaN };
    aboveSec -= sec;
    const isLastOfLevel = rising[at + 1]?.tenths !== tenths;
    if (isLastOfLevel && 100 * aboveSec <= percent * totalSec) return tenths / 10;
  }
  return null;
}
