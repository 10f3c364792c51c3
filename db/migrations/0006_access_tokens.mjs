export const up = (knex) =>
  knex.raw(`
    CREATE TABLE access_tokens (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      user_id CHAR(36) NOT NULL,
      name VARCHAR(160) NOT NULL,
      digest BINARY(32) NOT NULL COMMENT 'SHA-256 of the token',
      created_at DATETIME(3) NOT NULL,
      expires_at DATETIME(3) NOT NULL,
      revoked_at DATETIME(3) NULL,
      last_used_at DATETIME(3) NULL,
      UNIQUE KEY access_tokens_digest (digest),
      KEY access_tokens_user (user_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('access_tokens');
