export const up = (knex) =>
  knex.raw(`
    CREATE TABLE disk_samples (
      taken_at DATETIME(3) NOT NULL,
      total_bytes BIGINT UNSIGNED NOT NULL COMMENT 'of the file system that holds the data directory',
      free_bytes BIGINT UNSIGNED NOT NULL COMMENT 'that Bittern may still write',
      database_bytes BIGINT UNSIGNED NOT NULL COMMENT 'of all tables',
      PRIMARY KEY (taken_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('disk_samples');
