export const up = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      MODIFY COLUMN metric ENUM('LAeq', 'LAFmax', 'bandLeq', 'LAN', 'LAE', 'Lden', 'bandGroupLeq', 'LCeqLessLAeq',
        'LAeqLessLA90', 'LAeqLessUsual', 'tonalShare', 'eventCount') NOT NULL,
      MODIFY COLUMN averaging ENUM('15min', '1h', 'day', 'evening', 'night', 'length', 'hours', 'den') NOT NULL
        COMMENT 'length: window_min; hours: from_min to to_min of each date, one window; den: all periods of a date',
      ADD COLUMN percent TINYINT UNSIGNED NULL COMMENT 'of LAN' AFTER band_index,
      ADD COLUMN band_to_index TINYINT NULL COMMENT 'of bandGroupLeq the last band' AFTER percent,
      ADD COLUMN event_tenths SMALLINT NULL COMMENT 'of eventCount: what an event is above' AFTER band_to_index,
      ADD COLUMN event_minimum_sec SMALLINT UNSIGNED NULL COMMENT 'of eventCount' AFTER event_tenths
  `);

export const down = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      DROP COLUMN event_minimum_sec,
      DROP COLUMN event_tenths,
      DROP COLUMN band_to_index,
      DROP COLUMN percent,
      MODIFY COLUMN averaging ENUM('15min', '1h', 'day', 'evening', 'night', 'length', 'hours') NOT NULL
        COMMENT 'length: window_min; hours: from_min to to_min of each date, one window',
      MODIFY COLUMN metric ENUM('LAeq', 'LAFmax', 'bandLeq') NOT NULL
  `);
