export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_private (
      complaint_id INT UNSIGNED NOT NULL PRIMARY KEY,
      ciphertext BLOB NOT NULL COMMENT 'AES-256-GCM of the JSON: name, e-mail, phone, address, exact place, own words',
      updated_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_private');
