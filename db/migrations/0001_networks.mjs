export const up = (knex) =>
  knex.raw(`
    CREATE TABLE networks (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      slug VARCHAR(64) NOT NULL,
      name VARCHAR(160) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY networks_slug (slug)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('networks');
