export const up = (knex) =>
  knex.raw(`
    CREATE TABLE self_checks (
      station_id INT UNSIGNED NOT NULL,
      checked_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      level_centi_db SMALLINT NOT NULL COMMENT 'what the monitor measured of its own source',
      nominal_centi_db SMALLINT NOT NULL COMMENT 'what it should have measured',
      received_at INT UNSIGNED NOT NULL,
      PRIMARY KEY (station_id, checked_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('self_checks');
