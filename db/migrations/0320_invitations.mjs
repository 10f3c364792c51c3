export const up = (knex) =>
  knex.raw(`
    CREATE TABLE invitations (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      email VARCHAR(254) NOT NULL,
      name VARCHAR(160) NOT NULL,
      is_administrator BOOLEAN NOT NULL DEFAULT FALSE,
      roles JSON NOT NULL COMMENT 'list of network (slug) and role, given when it is accepted',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      expires_at DATETIME(3) NOT NULL COMMENT 'sending it again moves it on',
      mails SMALLINT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'how often it was sent',
      last_mail_at DATETIME(3) NULL,
      accepted_at DATETIME(3) NULL,
      withdrawn_at DATETIME(3) NULL,
      KEY invitations_email (email)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('invitations');
