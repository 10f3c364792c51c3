export const up = (knex) =>
  knex.raw(`
    CREATE TABLE clock_shift_starts (
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL COMMENT 'of the stored interval, as shifted',
      shift_id INT UNSIGNED NOT NULL,
      is_late TINYINT UNSIGNED NOT NULL COMMENT '1: came after the shift was made',
      PRIMARY KEY (station_id, starts_at),
      KEY clock_shift_starts_shift (shift_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('clock_shift_starts');
