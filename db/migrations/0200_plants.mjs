export const up = (knex) =>
  knex.raw(`
    CREATE TABLE plants (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      name VARCHAR(80) NOT NULL,
      version INT UNSIGNED NOT NULL COMMENT 'the version that holds now',
      created_at DATETIME(3) NOT NULL,
      retired_at DATETIME(3) NULL,
      retirement_reason VARCHAR(500) NULL,
      UNIQUE KEY plants_name (network_id, name)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('plants');
