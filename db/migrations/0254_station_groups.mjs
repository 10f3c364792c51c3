export const up = (knex) =>
  knex.raw(`
    CREATE TABLE station_groups (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      name VARCHAR(160) NOT NULL,
      station_ids JSON NOT NULL COMMENT 'as they are now; limit_versions keep what they were',
      changed_by CHAR(36) NULL,
      changed_at DATETIME(3) NOT NULL,
      UNIQUE KEY station_groups_name (network_id, name)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('station_groups');
