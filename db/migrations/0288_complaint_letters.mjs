export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_letters (
      reply_id INT UNSIGNED NOT NULL PRIMARY KEY,
      complaint_id INT UNSIGNED NOT NULL,
      ciphertext MEDIUMBLOB NOT NULL COMMENT 'AES-256-GCM of the PDF as it was sent',
      byte_count INT UNSIGNED NOT NULL,
      sha256 BINARY(32) NOT NULL COMMENT 'of the PDF',
      created_at DATETIME(3) NOT NULL,
      KEY complaint_letters_complaint (complaint_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_letters');
