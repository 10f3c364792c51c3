export const up = (knex) =>
  knex.raw(`
    CREATE TABLE job_runs (
      job VARCHAR(60) NOT NULL,
      slot DATETIME(3) NOT NULL,
      started_at DATETIME(3) NOT NULL,
      finished_at DATETIME(3) NULL,
      outcome VARCHAR(500) NULL,
      PRIMARY KEY (job, slot),
      KEY job_runs_started (started_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('job_runs');
