export const up = (knex) =>
  knex.raw(`
    CREATE TABLE outbox (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      message_id VARCHAR(200) NOT NULL COMMENT 'fixed Message-ID, the same at every attempt',
      dedupe_key VARCHAR(200) NOT NULL COMMENT 'one message a cause and recipient',
      network_id INT UNSIGNED NULL,
      kind VARCHAR(40) NOT NULL,
      recipient VARCHAR(254) NULL COMMENT 'null: resolved at sending from complaint_reply_id, so that no resident stands here',
      subject VARCHAR(300) NOT NULL,
      text_body MEDIUMTEXT NULL,
      html_body MEDIUMTEXT NULL,
      complaint_reply_id INT UNSIGNED NULL,
      state ENUM('waiting', 'sent', 'dead') NOT NULL DEFAULT 'waiting',
      attempts SMALLINT UNSIGNED NOT NULL DEFAULT 0,
      next_attempt_at DATETIME(3) NOT NULL,
      leased_until DATETIME(3) NULL,
      lease_holder VARCHAR(80) NULL,
      last_error VARCHAR(500) NULL,
      created_at DATETIME(3) NOT NULL,
      sent_at DATETIME(3) NULL,
      UNIQUE KEY outbox_message_id (message_id),
      UNIQUE KEY outbox_dedupe (dedupe_key),
      KEY outbox_due (state, next_attempt_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('outbox');
