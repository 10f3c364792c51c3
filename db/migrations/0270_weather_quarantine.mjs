export const up = (knex) =>
  knex.raw(`
    CREATE TABLE weather_quarantine (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      mast_id INT UNSIGNED NOT NULL,
      code VARCHAR(32) NOT NULL COMMENT 'of the refusal; superseded: was stored until a released record replaced it',
      detail VARCHAR(500) NOT NULL,
      record MEDIUMTEXT NOT NULL COMMENT 'JSON as received',
      record_digest BINARY(32) NOT NULL COMMENT 'the same refused record sent again is kept once',
      starts_at INT UNSIGNED NULL,
      received_at DATETIME(3) NOT NULL,
      times_received INT UNSIGNED NOT NULL DEFAULT 1,
      settlement ENUM('released', 'dismissed', 'superseded') NULL,
      settlement_reason VARCHAR(500) NULL,
      settled_at DATETIME(3) NULL,
      settled_by CHAR(36) NULL,
      UNIQUE KEY weather_quarantine_record (mast_id, code, record_digest),
      KEY weather_quarantine_open (mast_id, settlement, id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('weather_quarantine');
