export const up = (knex) =>
  knex.raw(`
    CREATE TABLE weather_records (
      mast_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      duration_sec SMALLINT UNSIGNED NOT NULL,
      wind_speed_centi_ms SMALLINT UNSIGNED NOT NULL COMMENT 'mean of the record',
      wind_direction_deg SMALLINT UNSIGNED NULL COMMENT 'from',
      rain_centi_mm SMALLINT UNSIGNED NULL COMMENT 'fallen in the record; NULL: no gauge',
      temperature_centi_c SMALLINT NULL,
      received_at INT UNSIGNED NOT NULL,
      PRIMARY KEY (mast_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('weather_records');
