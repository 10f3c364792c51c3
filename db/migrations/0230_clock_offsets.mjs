export const up = (knex) =>
  knex.raw(`
    CREATE TABLE clock_offsets (
      station_id INT UNSIGNED NOT NULL,
      quarter_starts_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC by our clock',
      ahead_sec DOUBLE NOT NULL COMMENT 'greatest sentAt less our time of the quarter-hour: the post with the shortest way',
      PRIMARY KEY (station_id, quarter_starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('clock_offsets');
