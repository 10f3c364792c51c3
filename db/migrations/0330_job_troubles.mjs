export const up = (knex) =>
  knex.raw(`
    CREATE TABLE job_troubles (
      job VARCHAR(40) NOT NULL,
      subject VARCHAR(120) NOT NULL COMMENT 'what the job could not do, such as "station 12"; nothing personal',
      network_id INT UNSIGNED NULL COMMENT 'whose operators are shown it; null: administrators only',
      failure VARCHAR(300) NOT NULL,
      times INT UNSIGNED NOT NULL,
      since DATETIME(3) NOT NULL,
      last_at DATETIME(3) NOT NULL,
      rests_until DATETIME(3) NOT NULL COMMENT 'not tried before',
      PRIMARY KEY (job, subject),
      KEY job_troubles_network (network_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('job_troubles');
