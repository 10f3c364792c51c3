export const up = (knex) =>
  knex.raw(`
    CREATE TABLE webhooks (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      url VARCHAR(500) NOT NULL,
      salt BINARY(16) NOT NULL COMMENT 'the secret is derived from it and the settings key, and stored nowhere',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      ended_at DATETIME(3) NULL,
      failures INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'attempts that failed one after another',
      failing_since DATETIME(3) NULL,
      next_attempt_at DATETIME(3) NOT NULL,
      disabled_at DATETIME(3) NULL COMMENT 'failed too long, or was told to be gone',
      disabled_reason VARCHAR(300) NULL,
      KEY webhooks_network (network_id, ended_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('webhooks');
