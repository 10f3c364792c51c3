/** A network as it is planned. */
export interface Plan {
  stations: number;
  intervalSec: number;
  bands: number;
  /** Days that single intervals are kept. */
  keptDays: number;
  /** Days that what is computed of them is kept. */
  computedDays: number;
  /** Seconds between two posts of a station. */
  postSec: number;
}

/** Rows, and the bytes that each takes on disk, keys and pages that are not full included. */
export interface TableSize {
  rows: number;
  bytesARow: number;
  bytes: number;
}

export interface Capacity {
  tables: Record<'interval_levels' | 'quarter_hours' | 'day_periods' | 'station_day_traces', TableSize>;
  diskBytes: number;
  intervalsASec: number;
  postsASec: number;
  /** Cores of webs that take posts, without people. */
  webCores: number;
  /** Cores of workers that recompute each running quarter-hour as it is posted. */
  workerCores: number;
  /** What databases should hold in memory: two days of intervals, a month of what is computed. */
  memoryBytes: number;
}

const DAY_SEC = 86_400;
/** Pages of a table that is appended to are filled so far. */
const FILLED = 15 / 16;
/** Of an interval without its bands: header, key, transaction, figures, lengths. */
const INTERVAL_BYTES = 58;
const BYTES_A_BAND_LEVEL = 2;
/** Measured with 31 bands in 28 days of minutes of six stations; what a band has of it follows from what is stored of one. */
const QUARTER_BYTES = { ofItself: 152, aBand: 13 };
const PERIODS_A_DAY = 3;
const PERIOD_BYTES = { ofItself: 400, aBand: 620 };
/** A byte a band and minute, in pages that a blob fills in part. */
const TRACE_BYTES = { ofItself: 2_000, aBand: 2_660 };
/** Processor time of a web: of a post of 60 intervals 1.9 ms, of one of 600 9.1 ms (ops/bench/README.md). */
const POST_MS = 1.1;
const INTERVAL_MS = 0.0133;
/** Intervals that a worker recomputes in a second of processor time, and what a running quarter-hour and its period cost besides. */
const RECOMPUTED_A_SEC = 78_000;
const QUARTER_MS = 7;
const HOT_INTERVAL_DAYS = 2;
const HOT_COMPUTED_DAYS = 31;

/** What a network needs, by bytes a row and processor times as measured: a first estimate, within a factor of about 1.5. */
export function capacityOf(plan: Plan): Capacity {
  const { stations, intervalSec, keptDays, computedDays, postSec } = plan;
  const tables = tablesOf(plan);
  const intervalsASec = stations / intervalSec;
  const postsASec = stations / postSec;
  const hot = tablesOf({
    ...plan,
    keptDays: Math.min(keptDays, HOT_INTERVAL_DAYS),
    computedDays: Math.min(computedDays, HOT_COMPUTED_DAYS),
  });
  // A post has its quarter-hour recomputed, which is half over in the mean.
  const recomputeMs = QUARTER_MS + (450 / intervalSec / RECOMPUTED_A_SEC) * 1000;
  return {
    tables,
    diskBytes: sumOf(tables),
    intervalsASec,
    postsASec,
    webCores: (postsASec * POST_MS + intervalsASec * INTERVAL_MS) / 1000,
    workerCores: (postsASec * recomputeMs) / 1000,
    memoryBytes: sumOf(hot),
  };
}

function tablesOf({ stations, intervalSec, bands, keptDays, computedDays }: Plan): Capacity['tables'] {
  const days = stations * computedDays;
  return {
    interval_levels: sizeOf(
      (stations * keptDays * DAY_SEC) / intervalSec,
      (INTERVAL_BYTES + BYTES_A_BAND_LEVEL * bands) / FILLED,
    ),
    quarter_hours: sizeOf(days * 96, QUARTER_BYTES.ofItself + QUARTER_BYTES.aBand * bands),
    day_periods: sizeOf(days * PERIODS_A_DAY, PERIOD_BYTES.ofItself + PERIOD_BYTES.aBand * bands),
    station_day_traces: sizeOf(days, TRACE_BYTES.ofItself + TRACE_BYTES.aBand * bands),
  };
}

function sizeOf(rows: number, bytesARow: number): TableSize {
  return { rows, bytesARow, bytes: rows * bytesARow };
}

function sumOf(tables: Capacity['tables']): number {
  return Object.values(tables).reduce((sum, { bytes }) => sum + bytes, 0);
}
