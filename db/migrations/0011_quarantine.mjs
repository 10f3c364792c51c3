export const up = (knex) =>
  knex.raw(`
    CREATE TABLE quarantine (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      station_id INT UNSIGNED NOT NULL,
      code VARCHAR(32) NOT NULL,
      detail VARCHAR(500) NOT NULL,
      record MEDIUMTEXT NOT NULL COMMENT 'JSON as received, with its bands',
      record_digest BINARY(32) NOT NULL COMMENT 'the same refused record sent again is kept once',
      starts_at INT UNSIGNED NULL,
      received_at DATETIME(3) NOT NULL,
      times_received INT UNSIGNED NOT NULL DEFAULT 1,
      settled_at DATETIME(3) NULL,
      settled_by CHAR(36) NULL,
      settlement ENUM('released', 'dismissed') NULL,
      UNIQUE KEY quarantine_record (station_id, code, record_digest),
      KEY quarantine_open (station_id, settled_at, id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('quarantine');
