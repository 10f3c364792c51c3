export const up = (knex) =>
  knex.raw(`
    CREATE TABLE health_settings (
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL COMMENT '0: of the whole network',
      thresholds JSON NOT NULL COMMENT 'those that differ from what holds otherwise',
      recipients JSON NOT NULL COMMENT 'e-mail addresses; empty: the operators of the network; of the network only',
      changed_by CHAR(36) NOT NULL,
      changed_at DATETIME(3) NOT NULL,
      PRIMARY KEY (network_id, station_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('health_settings');
