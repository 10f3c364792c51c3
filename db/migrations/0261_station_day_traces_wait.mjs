/** What was measured before there were traces waits for the worker to make them. */
export const up = (knex) =>
  knex.raw(`
    INSERT IGNORE INTO station_day_traces (station_id, starts_at)
    SELECT DISTINCT station_id, starts_at DIV 86400 * 86400 FROM quarter_hours
  `);

export const down = (knex) => knex('station_day_traces').delete();
