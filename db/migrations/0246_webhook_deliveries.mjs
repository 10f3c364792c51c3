export const up = (knex) =>
  knex.raw(`
    CREATE TABLE webhook_deliveries (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      webhook_id INT UNSIGNED NOT NULL,
      event_id CHAR(36) NOT NULL COMMENT 'the same at every attempt',
      event VARCHAR(40) NOT NULL,
      event_key VARCHAR(120) NOT NULL COMMENT 'one delivery a webhook and cause',
      body MEDIUMTEXT NOT NULL,
      state ENUM('waiting', 'delivered', 'dead') NOT NULL DEFAULT 'waiting',
      attempts SMALLINT UNSIGNED NOT NULL DEFAULT 0,
      leased_until DATETIME(3) NULL,
      lease_holder VARCHAR(80) NULL,
      last_outcome VARCHAR(300) NULL,
      created_at DATETIME(3) NOT NULL,
      last_attempt_at DATETIME(3) NULL,
      UNIQUE KEY webhook_deliveries_once (webhook_id, event_key),
      KEY webhook_deliveries_state (state, id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('webhook_deliveries');
