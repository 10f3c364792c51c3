export const up = (knex) =>
  knex.raw(`
    CREATE TABLE exceedance_mails (
      exceedance_id INT UNSIGNED NOT NULL,
      outbox_id BIGINT UNSIGNED NOT NULL COMMENT 'a message that tells of it, perhaps among others',
      PRIMARY KEY (exceedance_id, outbox_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('exceedance_mails');
