export const up = (knex) =>
  knex.raw(`
    CREATE TABLE memberships (
      user_id CHAR(36) NOT NULL,
      network_id INT UNSIGNED NOT NULL,
      role ENUM('operator', 'liaison', 'regulator') NOT NULL,
      created_at DATETIME(3) NOT NULL,
      PRIMARY KEY (user_id, network_id, role),
      KEY memberships_network (network_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('memberships');
