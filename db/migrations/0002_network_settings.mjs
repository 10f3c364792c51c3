export const up = (knex) =>
  knex.raw(`
    CREATE TABLE network_settings (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      effective_from INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC; the latest row at or before an instant holds there',
      time_zone VARCHAR(64) NOT NULL,
      day_start_min SMALLINT UNSIGNED NOT NULL COMMENT 'minutes after local midnight',
      evening_start_min SMALLINT UNSIGNED NULL COMMENT 'null: a network without an evening',
      night_start_min SMALLINT UNSIGNED NOT NULL,
      minimum_coverage DOUBLE NOT NULL,
      maximum_wind_speed_ms DOUBLE NOT NULL,
      exclude_rain BOOLEAN NOT NULL,
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY network_settings_effective (network_id, effective_from)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('network_settings');
