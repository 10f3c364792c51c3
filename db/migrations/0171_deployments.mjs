export const up = (knex) =>
  knex.raw(`
    CREATE TABLE deployments (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      instrument_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      ends_at INT UNSIGNED NULL COMMENT 'half-open; null: still there',
      note VARCHAR(500) NOT NULL DEFAULT '',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_by CHAR(36) NULL,
      withdrawn_at DATETIME(3) NULL COMMENT 'set: it was noted by mistake and never was',
      withdrawal_reason VARCHAR(500) NULL,
      KEY deployments_station (station_id, starts_at),
      KEY deployments_instrument (instrument_id, starts_at),
      KEY deployments_network (network_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('deployments');
