export const up = (knex) =>
  knex.raw(`
    CREATE TABLE exceedances (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      limit_id INT UNSIGNED NOT NULL,
      limit_version_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL,
      level_db DOUBLE NOT NULL,
      threshold_tenths SMALLINT NOT NULL,
      coverage DOUBLE NOT NULL,
      state ENUM('standing', 'lifted') NOT NULL DEFAULT 'standing' COMMENT 'lifted: later data or an exclusion took it below the limit or its coverage',
      detected_at DATETIME(3) NOT NULL,
      revised_at DATETIME(3) NULL,
      cause VARCHAR(160) NULL,
      note TEXT NULL,
      acknowledged_by CHAR(36) NULL,
      acknowledged_at DATETIME(3) NULL,
      UNIQUE KEY exceedances_window (limit_id, station_id, starts_at),
      KEY exceedances_network (network_id, starts_at),
      KEY exceedances_station (station_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('exceedances');
