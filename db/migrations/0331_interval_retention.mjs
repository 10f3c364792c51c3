export const up = (knex) =>
  knex.raw(`
    CREATE TABLE interval_retention (
      network_id INT UNSIGNED NOT NULL,
      keep_months SMALLINT UNSIGNED NULL COMMENT 'single intervals of whole months older than this are deleted; null: never',
      changed_by CHAR(36) NOT NULL,
      changed_at DATETIME(3) NOT NULL,
      PRIMARY KEY (network_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('interval_retention');
