export const up = (knex) =>
  knex.raw(`
    CREATE TABLE doubt_decisions (
      calibration_id INT UNSIGNED NOT NULL COMMENT 'the check that made the data doubtful',
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL COMMENT 'of the doubtful stretch; another beginning is another decision',
      ends_at INT UNSIGNED NOT NULL,
      decision ENUM('keep', 'exclude') NOT NULL,
      exclusion_id INT UNSIGNED NULL,
      reason VARCHAR(500) NOT NULL,
      decided_by CHAR(36) NOT NULL,
      decided_at DATETIME(3) NOT NULL,
      PRIMARY KEY (calibration_id, station_id, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('doubt_decisions');
