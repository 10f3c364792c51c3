export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_additions (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      complaint_id INT UNSIGNED NOT NULL,
      ciphertext BLOB NOT NULL COMMENT 'AES-256-GCM of what the resident wrote later',
      created_at DATETIME(3) NOT NULL,
      KEY complaint_additions_complaint (complaint_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_additions');
