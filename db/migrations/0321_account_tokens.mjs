export const up = (knex) =>
  knex.raw(`
    CREATE TABLE account_tokens (
      digest BINARY(32) NOT NULL PRIMARY KEY COMMENT 'SHA-256 of the token in a link that was mailed',
      purpose ENUM('invitation', 'password-reset') NOT NULL,
      subject CHAR(36) NOT NULL COMMENT 'id of the invitation, or of the person',
      created_at DATETIME(3) NOT NULL,
      expires_at DATETIME(3) NOT NULL,
      KEY account_tokens_subject (purpose, subject),
      KEY account_tokens_expiry (expires_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_bin
  `);

export const down = (knex) => knex.schema.dropTable('account_tokens');
