export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_received (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      complaint_id INT UNSIGNED NOT NULL,
      source ENUM('message', 'note') NOT NULL COMMENT 'an e-mail as it came, or what a person noted',
      ciphertext MEDIUMBLOB NOT NULL COMMENT 'AES-256-GCM of the JSON: from, subject, text, Message-ID',
      message_digest BINARY(32) NULL COMMENT 'SHA-256 of its Message-ID: the same one is filed once',
      received_at DATETIME(3) NOT NULL,
      filed_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_by CHAR(36) NULL,
      withdrawn_at DATETIME(3) NULL,
      UNIQUE KEY complaint_received_once (complaint_id, message_digest),
      KEY complaint_received_complaint (complaint_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_received');
