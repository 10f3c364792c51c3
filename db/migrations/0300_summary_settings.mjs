export const up = (knex) =>
  knex.raw(`
    CREATE TABLE summary_settings (
      network_id INT UNSIGNED NOT NULL,
      version INT UNSIGNED NOT NULL COMMENT 'counts from 1; the last one holds',
      grace_days TINYINT UNSIGNED NOT NULL COMMENT 'days after the end of a month before it is drafted',
      template JSON NOT NULL COMMENT 'how the month looks in print',
      mark_sha256 BINARY(32) NULL COMMENT 'names the mark under the data directory; null: none',
      mark_media_type VARCHAR(40) NULL,
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      PRIMARY KEY (network_id, version)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('summary_settings');
