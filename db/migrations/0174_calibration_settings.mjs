export const up = (knex) =>
  knex.raw(`
    CREATE TABLE calibration_settings (
      network_id INT UNSIGNED NOT NULL PRIMARY KEY,
      drift_bound_centi_db SMALLINT UNSIGNED NOT NULL,
      check_every_days SMALLINT UNSIGNED NOT NULL,
      remind_before_days SMALLINT UNSIGNED NOT NULL,
      recipients JSON NOT NULL COMMENT 'e-mail addresses; empty: the operators of the network',
      changed_by CHAR(36) NOT NULL,
      changed_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('calibration_settings');
