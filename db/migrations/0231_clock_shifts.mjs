export const up = (knex) =>
  knex.raw(`
    CREATE TABLE clock_shifts (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      from_sec INT UNSIGNED NOT NULL COMMENT 'first start of the episode by the clock of the monitor, epoch seconds',
      to_sec INT UNSIGNED NOT NULL COMMENT 'exclusive',
      shift_sec INT NOT NULL COMMENT 'added to starts of the episode',
      received_from_sec INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'what came before is not of the episode',
      reason VARCHAR(500) NOT NULL,
      state ENUM('moving', 'moved', 'reversing', 'reversed') NOT NULL,
      planned_count INT UNSIGNED NOT NULL,
      moved_count INT UNSIGNED NOT NULL DEFAULT 0,
      aside_count INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'put into quarantine by the reversal',
      problem VARCHAR(300) NULL COMMENT 'why it was put back by itself',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      reversed_by CHAR(36) NULL,
      reversal_reason VARCHAR(500) NULL,
      finished_at DATETIME(3) NULL COMMENT 'of the move, then of the reversal',
      KEY clock_shifts_station (station_id, state),
      KEY clock_shifts_state (state)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('clock_shifts');
