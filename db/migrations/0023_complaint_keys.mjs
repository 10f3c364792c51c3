export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_keys (
      complaint_id INT UNSIGNED NOT NULL PRIMARY KEY,
      wrapped_key VARBINARY(80) NOT NULL COMMENT 'AES-256-GCM key wrapped by the personal-data key of the settings; destroying it erases the person',
      created_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_keys');
