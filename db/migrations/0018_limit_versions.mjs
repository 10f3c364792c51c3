export const up = (knex) =>
  knex.raw(`
    CREATE TABLE limit_versions (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      limit_id INT UNSIGNED NOT NULL,
      version SMALLINT UNSIGNED NOT NULL,
      effective_from INT UNSIGNED NOT NULL COMMENT 'epoch seconds; windows that begin from here on are judged by it',
      name VARCHAR(160) NOT NULL,
      metric ENUM('LAeq', 'LAFmax', 'bandLeq') NOT NULL,
      averaging ENUM('15min', '1h', 'day', 'evening', 'night') NOT NULL,
      band_fraction TINYINT UNSIGNED NULL,
      band_index TINYINT NULL,
      threshold_tenths SMALLINT NOT NULL COMMENT 'exceeded when the level, rounded half up to tenths, is greater',
      weekdays TINYINT UNSIGNED NOT NULL DEFAULT 127 COMMENT 'bit 0 Monday … bit 6 Sunday, of the local date on which the window begins',
      from_min SMALLINT UNSIGNED NULL COMMENT 'local clock, minutes after midnight; null: all day',
      to_min SMALLINT UNSIGNED NULL COMMENT 'before from_min: across midnight',
      minimum_coverage DOUBLE NULL COMMENT 'null: the network minimum',
      station_ids JSON NULL COMMENT 'null: every station of the network',
      recipients JSON NOT NULL COMMENT 'e-mail addresses',
      reason VARCHAR(500) NOT NULL DEFAULT '',
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY limit_versions_version (limit_id, version)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('limit_versions');
