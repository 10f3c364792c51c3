export const up = (knex) =>
  knex.raw(`
    CREATE TABLE import_intervals (
      import_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      duration_sec SMALLINT UNSIGNED NOT NULL,
      laeq_centi_db SMALLINT NOT NULL,
      lafmax_centi_db SMALLINT NULL,
      lafmin_centi_db SMALLINT NULL,
      lceq_centi_db SMALLINT NULL,
      lcpeak_centi_db SMALLINT NULL,
      band_set_id SMALLINT UNSIGNED NOT NULL,
      band_levels_centi_db VARBINARY(66) NOT NULL COMMENT 'int16 little endian a band of the set; -32768 = none',
      flags SMALLINT UNSIGNED NOT NULL,
      wind_speed_centi_ms SMALLINT UNSIGNED NULL,
      wind_direction_deg SMALLINT UNSIGNED NULL,
      temperature_centi_c SMALLINT NULL,
      battery_centi_v SMALLINT UNSIGNED NULL,
      received_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      PRIMARY KEY (import_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
      COMMENT = 'what an import would store, or has stored until it was undone'
  `);

export const down = (knex) => knex.schema.dropTable('import_intervals');
