import { type Connection } from './connection';

/** Values of which each is one step above the one before, by the first and the last of them. */
export interface Run {
  first: number;
  last: number;
}

/** Runs that have exactly these values, ascending, each once, which are multiples of the step apart. */
export function runsOf(values: readonly number[], step: number): Run[] {
  const runs: Run[] = [];
  for (const value of [...new Set(values)].sort((a, b) => a - b)) {
    const run = runs.at(-1);
    if (run && value === run.last + step) run.last = value;
    else runs.push({ first: value, last: value });
  }
  return runs;
}

const RUNS_A_STATEMENT = 500;

/** Deletes a station's rows whose value of a column lies in any of some runs; the table has none between a run's values. */
export async function deleteRuns(
  { table, stationId, column }: { table: string; stationId: number; column: string },
  runs: readonly Run[],
  conn: Connection,
): Promise<void> {
  for (let from = 0; from < runs.length; from += RUNS_A_STATEMENT) {
    const some = runs.slice(from, from + RUNS_A_STATEMENT);
    await conn.raw(
      `DELETE FROM ?? WHERE station_id = ? AND (${some.map(() => '?? BETWEEN ? AND ?').join(' OR ')})`,
      [table, stationId, ...some.flatMap(({ first, last }) => [column, first, last])],
    );
  }
}
