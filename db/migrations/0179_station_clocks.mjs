export const up = (knex) =>
  knex.raw(`
    CREATE TABLE station_clocks (
      station_id INT UNSIGNED NOT NULL PRIMARY KEY,
      ahead_sec DOUBLE NOT NULL COMMENT 'sentAt of the newest post less our time; negative: the clock is slow, or the way was long',
      ahead_before_sec DOUBLE NOT NULL COMMENT 'the same of the post before',
      noted_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('station_clocks');
