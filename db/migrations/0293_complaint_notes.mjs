export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_notes (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      complaint_id INT UNSIGNED NOT NULL,
      ciphertext BLOB NOT NULL COMMENT 'AES-256-GCM of the note: it may name somebody',
      author CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_by CHAR(36) NULL,
      withdrawn_at DATETIME(3) NULL,
      KEY complaint_notes_complaint (complaint_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_notes');
