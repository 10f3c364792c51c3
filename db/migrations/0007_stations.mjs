export const up = (knex) =>
  knex.raw(`
    CREATE TABLE stations (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      code VARCHAR(32) NOT NULL,
      name VARCHAR(160) NOT NULL,
      latitude DOUBLE NOT NULL,
      longitude DOUBLE NOT NULL,
      band_fraction TINYINT UNSIGNED NOT NULL COMMENT '1 octave, 3 one-third octave',
      interval_sec SMALLINT UNSIGNED NOT NULL,
      first_band_index TINYINT NOT NULL COMMENT 'n of 1000 Hz times 10^(n/10)',
      last_band_index TINYINT NOT NULL,
      placement ENUM('free-field', 'facade') NOT NULL DEFAULT 'free-field',
      mast_height_m DOUBLE NULL,
      surroundings VARCHAR(500) NOT NULL DEFAULT '',
      accepts_from INT UNSIGNED NULL COMMENT 'epoch seconds; older intervals are refused as too-old; null: no bound',
      created_at DATETIME(3) NOT NULL,
      retired_at DATETIME(3) NULL,
      UNIQUE KEY stations_code (network_id, code)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('stations');
