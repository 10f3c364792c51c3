export const up = (knex) =>
  knex.raw(`
    CREATE TABLE report_forms (
      network_id INT UNSIGNED NOT NULL PRIMARY KEY,
      is_open BOOLEAN NOT NULL,
      areas JSON NOT NULL COMMENT 'names that residents choose from, each with the code of its station',
      keeper VARCHAR(300) NOT NULL COMMENT 'who keeps what residents send, and how to reach them; stands in the consent text',
      changed_by CHAR(36) NOT NULL,
      changed_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('report_forms');
