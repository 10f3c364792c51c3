export const up = (knex) =>
  knex.raw(`
    CREATE TABLE mast_assignments (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      mast_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NULL COMMENT 'NULL: goes on',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      ended_by CHAR(36) NULL,
      KEY mast_assignments_station (station_id, starts_at),
      KEY mast_assignments_mast (mast_id, starts_at),
      KEY mast_assignments_network (network_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('mast_assignments');
