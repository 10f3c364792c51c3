import { pool } from '#db/queries/connection';
import { INTERVAL_COLUMNS } from '#db/queries/intervalRows';
import { type StationRow } from '#db/queries/stations';
import { median, msOf } from './measure';
import { FIRST_SEC, MONTH_SEC } from './months';

export type Work = () => Promise<unknown>;

/** Medians of one work, by the clock and by processor time of this process alone. */
export interface Ratio {
  ratio: number;
  cpuRatio: number;
  ms: number;
  againstMs: number;
}

/** What every round of one work took. */
interface Taken {
  ms: number[];
  cpuMs: number[];
}

/** Before those that count, so that everything is compiled as in a process that has run for a while. */
const WARM_ROUNDS = 20;

/** Every work and R, turn by turn, after some for warmth. */
export async function measure(
  station: StationRow,
  works: Record<string, Work>,
  rounds: number,
): Promise<Record<string, Ratio>> {
  const fetching: Taken = { ms: [], cpuMs: [] };
  const times = Object.entries(works).map(([name, work]) => ({ name, work, ms: [], cpuMs: [] }));
  for (let round = -WARM_ROUNDS; round < rounds; round += 1) {
    await take(() => fetchMonth(station), fetching, round);
    for (const taken of times) await take(taken.work, taken, round);
  }
  return Object.fromEntries(times.map(({ name, ...taken }) => [name, ratioOf(taken, fetching)]));
}

async function take(work: Work, into: Taken, round: number): Promise<void> {
  const before = process.cpuUsage();
  const tookMs = await msOf(work);
  const { user, system } = process.cpuUsage(before);
  if (round < 0) return;
  into.ms.push(tookMs);
  into.cpuMs.push((user + system) / 1000);
}

function ratioOf({ ms, cpuMs }: Taken, against: Taken): Ratio {
  return {
    ratio: median(ms) / median(against.ms),
    cpuRatio: median(cpuMs) / median(against.cpuMs),
    ms: median(ms),
    againstMs: median(against.ms),
  };
}

/** R. */
async function fetchMonth({ id }: StationRow): Promise<void> {
  await pool()
    .raw(
      `SELECT ${INTERVAL_COLUMNS} FROM interval_levels WHERE station_id = ? AND starts_at >= ? AND starts_at < ?`,
      [id, FIRST_SEC, FIRST_SEC + MONTH_SEC],
    )
    .options({ rowsAsArray: true });
}
