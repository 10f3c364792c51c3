export const up = (knex) =>
  knex.raw(`
    CREATE TABLE alert_preferences (
      network_id INT UNSIGNED NOT NULL,
      user_id CHAR(36) NOT NULL,
      delivery ENUM('at-once', 'hourly', 'daily') NOT NULL,
      daily_at_min SMALLINT UNSIGNED NOT NULL COMMENT 'minutes after midnight, civil time of the network',
      group_min SMALLINT UNSIGNED NOT NULL COMMENT 'least minutes between two messages',
      quiet_from_min SMALLINT UNSIGNED NULL COMMENT 'minutes after midnight, civil time; null: no quiet hours',
      quiet_to_min SMALLINT UNSIGNED NULL,
      override_tenths SMALLINT UNSIGNED NULL COMMENT 'tenths of a dB above the limit from which it is told at once; null: never',
      station_ids JSON NULL COMMENT 'null: every station',
      warns_early TINYINT(1) NOT NULL DEFAULT 0,
      changed_at DATETIME(3) NOT NULL,
      PRIMARY KEY (network_id, user_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('alert_preferences');
