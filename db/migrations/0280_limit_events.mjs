export const up = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      MODIFY COLUMN metric ENUM('LAeq', 'LAFmax', 'bandLeq', 'LAN', 'LAE', 'Lden', 'bandGroupLeq', 'LCeqLessLAeq',
        'LAeqLessLA90', 'LAeqLessUsual', 'tonalShare', 'eventCount', 'eventLAE') NOT NULL,
      ADD COLUMN event_gap_sec SMALLINT UNSIGNED NULL COMMENT 'of events: gaps that are bridged; NULL: 10 s' AFTER event_minimum_sec
  `);

export const down = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      DROP COLUMN event_gap_sec,
      MODIFY COLUMN metric ENUM('LAeq', 'LAFmax', 'bandLeq', 'LAN', 'LAE', 'Lden', 'bandGroupLeq', 'LCeqLessLAeq',
        'LAeqLessLA90', 'LAeqLessUsual', 'tonalShare', 'eventCount') NOT NULL
  `);
