export const up = (knex) =>
  knex.raw(`
    CREATE TABLE mast_tokens (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      mast_id INT UNSIGNED NOT NULL,
      digest BINARY(32) NOT NULL COMMENT 'SHA-256 of the token',
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      revoked_at DATETIME(3) NULL,
      last_used_at DATETIME(3) NULL,
      UNIQUE KEY mast_tokens_digest (digest),
      KEY mast_tokens_mast (mast_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('mast_tokens');
