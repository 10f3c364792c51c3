export const up = (knex) =>
  knex.raw(`
    CREATE TABLE answering_settings (
      network_id INT UNSIGNED NOT NULL PRIMARY KEY,
      needs_approval TINYINT(1) NOT NULL DEFAULT 0 COMMENT 'a second person approves an answer before it goes',
      reply_address VARCHAR(254) NULL COMMENT 'where residents answer to; {reference} in it is filled in; null: the sender',
      updated_by CHAR(36) NOT NULL,
      updated_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('answering_settings');
