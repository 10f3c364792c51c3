export const up = (knex) =>
  knex.raw(`
    CREATE TABLE day_periods (
      station_id INT UNSIGNED NOT NULL,
      local_date DATE NOT NULL COMMENT 'the date on which the period begins',
      period ENUM('day', 'evening', 'night') NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL,
      valid_sec INT UNSIGNED NOT NULL,
      excluded_sec INT UNSIGNED NOT NULL,
      sample_sec SMALLINT UNSIGNED NULL,
      is_sample_mixed BOOLEAN NOT NULL,
      a_energy_sec DOUBLE NOT NULL,
      c_energy_sec DOUBLE NOT NULL,
      c_valid_sec INT UNSIGNED NOT NULL,
      lafmax_centi_db SMALLINT NULL,
      lafmin_centi_db SMALLINT NULL,
      lcpeak_centi_db SMALLINT NULL,
      band_fraction TINYINT UNSIGNED NULL,
      band_energies VARBINARY(600) NOT NULL,
      a_classes BLOB NOT NULL,
      band_classes MEDIUMBLOB NOT NULL COMMENT 'class counts of every third and every octave',
      flags SMALLINT UNSIGNED NOT NULL,
      computed_at DATETIME(3) NOT NULL,
      PRIMARY KEY (station_id, local_date, period),
      KEY day_periods_start (station_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('day_periods');
