export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_replies (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      complaint_id INT UNSIGNED NOT NULL,
      ciphertext MEDIUMBLOB NOT NULL COMMENT 'AES-256-GCM of the JSON: recipient, subject, body',
      figures JSON NOT NULL COMMENT 'the figures the letter carries, as sent',
      sent_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      KEY complaint_replies_complaint (complaint_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_replies');
