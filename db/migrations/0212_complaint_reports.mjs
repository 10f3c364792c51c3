export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_reports (
      complaint_id INT UNSIGNED NOT NULL PRIMARY KEY,
      key_digest BINARY(32) NOT NULL COMMENT 'SHA-256 of the key in the address of the private page; the key itself is with the resident only',
      area VARCHAR(80) NULL COMMENT 'of the list of the network; coarse, so it may stand open',
      language CHAR(2) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY complaint_reports_key (key_digest)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_reports');
