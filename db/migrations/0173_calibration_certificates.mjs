export const up = (knex) =>
  knex.raw(`
    CREATE TABLE calibration_certificates (
      calibration_id INT UNSIGNED NOT NULL PRIMARY KEY,
      media_type VARCHAR(40) NOT NULL COMMENT 'as the bytes say, not as the sender said',
      byte_count INT UNSIGNED NOT NULL,
      sha256 BINARY(32) NOT NULL COMMENT 'names the file under the data directory',
      uploaded_by CHAR(36) NOT NULL,
      uploaded_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('calibration_certificates');
