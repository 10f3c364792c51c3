export const up = (knex) =>
  knex.raw(`
    CREATE TABLE limits (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_at DATETIME(3) NULL,
      withdrawn_by CHAR(36) NULL,
      KEY limits_network (network_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('limits');
