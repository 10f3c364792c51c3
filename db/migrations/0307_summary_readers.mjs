export const up = (knex) =>
  knex.raw(`
    CREATE TABLE summary_readers (
      network_id INT UNSIGNED NOT NULL,
      user_id CHAR(36) NOT NULL,
      is_told TINYINT(1) NULL COMMENT 'e-mail when a month is issued or revised; null: as the role has it',
      visited_at DATETIME(3) NULL COMMENT 'when the person looked at the months last',
      previous_visit_at DATETIME(3) NULL COMMENT 'what changed is told since then',
      PRIMARY KEY (network_id, user_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('summary_readers');
