export const up = (knex) =>
  knex.raw(`
    CREATE TABLE pending_windows (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      limit_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL COMMENT 'judged once the window has closed; again when its data change',
      KEY pending_windows_due (ends_at, id),
      KEY pending_windows_window (limit_id, station_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('pending_windows');
