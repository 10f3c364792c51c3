export const up = (knex) =>
  knex.raw(`
    CREATE TABLE quarter_hours (
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC, a multiple of 900',
      valid_sec SMALLINT UNSIGNED NOT NULL,
      excluded_sec SMALLINT UNSIGNED NOT NULL,
      sample_sec SMALLINT UNSIGNED NULL COMMENT 'length of the valid intervals; null when mixed or none',
      is_sample_mixed BOOLEAN NOT NULL,
      a_energy_sec DOUBLE NOT NULL COMMENT 'sum over valid seconds of 10^(LAeq/10)',
      c_energy_sec DOUBLE NOT NULL,
      c_valid_sec SMALLINT UNSIGNED NOT NULL,
      lafmax_centi_db SMALLINT NULL,
      lafmin_centi_db SMALLINT NULL,
      lcpeak_centi_db SMALLINT NULL,
      band_fraction TINYINT UNSIGNED NULL COMMENT 'null when no bands or mixed',
      band_energies VARBINARY(600) NOT NULL COMMENT 'see db/queries/packing',
      a_classes BLOB NOT NULL COMMENT 'LevelClassCounts of LAeq',
      flags SMALLINT UNSIGNED NOT NULL COMMENT 'flags seen in the quarter, valid or not',
      computed_at DATETIME(3) NOT NULL,
      PRIMARY KEY (station_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('quarter_hours');
