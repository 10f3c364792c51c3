export const up = (knex) =>
  knex.raw(`
    CREATE TABLE network_holidays (
      network_id INT UNSIGNED NOT NULL,
      date CHAR(10) CHARACTER SET ascii NOT NULL COMMENT 'civil date in the zone of the network',
      name VARCHAR(160) NOT NULL,
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      PRIMARY KEY (network_id, date)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('network_holidays');
