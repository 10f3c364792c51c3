export const up = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      MODIFY COLUMN percent TINYINT UNSIGNED NULL COMMENT 'of LAN, and of the background of LAeqLessLA90',
      ADD COLUMN background_from_min SMALLINT UNSIGNED NULL
        COMMENT 'of LAeqLessLA90: hours that the background is of; NULL: the window itself' AFTER event_minimum_sec,
      ADD COLUMN background_to_min SMALLINT UNSIGNED NULL AFTER background_from_min
  `);

export const down = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      DROP COLUMN background_to_min,
      DROP COLUMN background_from_min,
      MODIFY COLUMN percent TINYINT UNSIGNED NULL COMMENT 'of LAN'
  `);
