export const up = (knex) =>
  knex.raw(`
    ALTER TABLE stations
      ADD COLUMN expected_flags SMALLINT UNSIGNED NOT NULL DEFAULT 60
        COMMENT 'bits as in interval_levels.flags; by default calibration, selfcheck, rain, wind' AFTER accepts_from
  `);

export const down = (knex) => knex.raw('ALTER TABLE stations DROP COLUMN expected_flags');
