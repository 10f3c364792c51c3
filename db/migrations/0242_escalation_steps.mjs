export const up = (knex) =>
  knex.raw(`
    CREATE TABLE escalation_steps (
      network_id INT UNSIGNED NOT NULL,
      step TINYINT UNSIGNED NOT NULL COMMENT '1, 2, …',
      after_min SMALLINT UNSIGNED NOT NULL COMMENT 'minutes after an exceedance was found that nobody has acknowledged',
      user_ids JSON NOT NULL COMMENT 'who is told then',
      changed_by CHAR(36) NOT NULL,
      changed_at DATETIME(3) NOT NULL COMMENT 'what was found before is not escalated by it',
      PRIMARY KEY (network_id, step)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('escalation_steps');
