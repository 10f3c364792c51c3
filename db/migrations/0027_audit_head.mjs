export const up = (knex) =>
  knex.raw(`
    CREATE TABLE audit_head (
      only_row TINYINT UNSIGNED NOT NULL PRIMARY KEY,
      last_id BIGINT UNSIGNED NOT NULL,
      last_digest BINARY(32) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('audit_head');
