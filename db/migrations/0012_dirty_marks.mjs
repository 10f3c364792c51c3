export const up = (knex) =>
  knex.raw(`
    CREATE TABLE dirty_marks (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      station_id INT UNSIGNED NOT NULL,
      quarter_starts_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC, a multiple of 900',
      marked_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      KEY dirty_marks_quarter (station_id, quarter_starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('dirty_marks');
