export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_attachments (
      complaint_id INT UNSIGNED NOT NULL PRIMARY KEY,
      media_type VARCHAR(40) NOT NULL COMMENT 'by its first bytes; the name that the resident gave it is not kept',
      byte_count INT UNSIGNED NOT NULL,
      ciphertext MEDIUMBLOB NOT NULL COMMENT 'AES-256-GCM of the file',
      created_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_attachments');
