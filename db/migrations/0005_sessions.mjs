export const up = (knex) =>
  knex.raw(`
    CREATE TABLE sessions (
      id_digest CHAR(64) NOT NULL PRIMARY KEY COMMENT 'SHA-256 of the session id in the cookie',
      user_id CHAR(36) NOT NULL,
      expires_at DATETIME(3) NOT NULL COMMENT 'moves on while the session is used',
      ends_at DATETIME(3) NOT NULL COMMENT 'absolute lifetime',
      created_at DATETIME(3) NOT NULL,
      KEY sessions_user (user_id),
      KEY sessions_expiry (expires_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('sessions');
