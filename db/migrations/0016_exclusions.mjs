export const up = (knex) =>
  knex.raw(`
    CREATE TABLE exclusions (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL,
      reason VARCHAR(500) NOT NULL,
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_by CHAR(36) NULL,
      withdrawn_at DATETIME(3) NULL,
      withdrawal_reason VARCHAR(500) NULL,
      KEY exclusions_period (station_id, starts_at, ends_at),
      KEY exclusions_network (network_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('exclusions');
