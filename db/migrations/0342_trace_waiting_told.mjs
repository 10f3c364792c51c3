export const up = (knex) =>
  knex.raw(
    `ALTER TABLE station_day_traces MODIFY is_waiting TINYINT UNSIGNED NOT NULL DEFAULT 1
       COMMENT '1: to be made; 0: made'`,
  );

export const down = (knex) =>
  knex.raw(
    `ALTER TABLE station_day_traces DROP KEY waiting, DROP COLUMN is_waiting,
       ADD COLUMN is_waiting TINYINT UNSIGNED AS (shapes IS NULL) STORED, ADD KEY waiting (is_waiting, starts_at)`,
  );
