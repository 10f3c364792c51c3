export const up = (knex) =>
  knex.raw(`
    CREATE TABLE issued_summary_files (
      summary_id INT UNSIGNED NOT NULL,
      format VARCHAR(10) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
      name VARCHAR(160) NOT NULL,
      media_type VARCHAR(120) NOT NULL,
      byte_count INT UNSIGNED NOT NULL,
      sha256 BINARY(32) NOT NULL COMMENT 'names the file under the data directory',
      PRIMARY KEY (summary_id, format),
      KEY issued_summary_files_sha256 (sha256)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('issued_summary_files');
