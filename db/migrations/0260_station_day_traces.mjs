export const up = (knex) =>
  knex.raw(`
    CREATE TABLE station_day_traces (
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL COMMENT 'beginning of a day of UTC',
      outline BLOB NULL COMMENT 'per minute the means of groups of thirds; NULL: waits to be made',
      shapes MEDIUMBLOB NULL COMMENT 'per minute level, mean and thirds about it; NULL: waits to be made',
      PRIMARY KEY (station_id, starts_at),
      is_waiting TINYINT UNSIGNED AS (shapes IS NULL) PERSISTENT,
      KEY waiting (is_waiting, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('station_day_traces');
