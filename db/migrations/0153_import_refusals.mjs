export const up = (knex) =>
  knex.raw(`
    CREATE TABLE import_refusals (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      import_id INT UNSIGNED NOT NULL,
      code VARCHAR(32) NOT NULL,
      detail VARCHAR(500) NOT NULL,
      record MEDIUMTEXT NOT NULL COMMENT 'JSON as in the quarantine, where it goes when the import is stored',
      starts_at INT UNSIGNED NULL,
      KEY import_refusals_import (import_id, id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('import_refusals');
