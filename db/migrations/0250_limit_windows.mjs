export const up = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      MODIFY COLUMN averaging ENUM('15min', '1h', 'day', 'evening', 'night', 'length', 'hours') NOT NULL
        COMMENT 'length: window_min; hours: from_min to to_min of each date, one window',
      ADD COLUMN window_min SMALLINT UNSIGNED NULL COMMENT 'of averaging length, minutes' AFTER averaging,
      ADD COLUMN step_min TINYINT UNSIGNED NULL COMMENT 'rolling windows begin so often; null: fixed' AFTER window_min,
      ADD COLUMN holidays ENUM('as-weekday', 'as-sunday', 'never', 'only') NOT NULL DEFAULT 'as-weekday'
        COMMENT 'what the dates of network_holidays are to it' AFTER weekdays
  `);

export const down = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      DROP COLUMN holidays,
      DROP COLUMN step_min,
      DROP COLUMN window_min,
      MODIFY COLUMN averaging ENUM('15min', '1h', 'day', 'evening', 'night') NOT NULL
  `);
