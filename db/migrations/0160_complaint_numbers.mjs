export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_numbers (
      prefix VARCHAR(8) NOT NULL,
      year SMALLINT UNSIGNED NOT NULL,
      last_number INT UNSIGNED NOT NULL COMMENT 'the last one given out; a number is never given twice, even after an erasure',
      PRIMARY KEY (prefix, year)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_numbers');
