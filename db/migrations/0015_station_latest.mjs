export const up = (knex) =>
  knex.raw(`
    CREATE TABLE station_latest (
      station_id INT UNSIGNED NOT NULL PRIMARY KEY,
      starts_at INT UNSIGNED NOT NULL,
      duration_sec SMALLINT UNSIGNED NOT NULL,
      laeq_centi_db SMALLINT NOT NULL,
      lafmax_centi_db SMALLINT NULL,
      flags SMALLINT UNSIGNED NOT NULL,
      wind_speed_centi_ms SMALLINT UNSIGNED NULL,
      battery_centi_v SMALLINT UNSIGNED NULL,
      received_at DATETIME(3) NOT NULL,
      KEY station_latest_received (received_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('station_latest');
