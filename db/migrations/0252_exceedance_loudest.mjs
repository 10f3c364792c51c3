export const up = (knex) =>
  knex.raw(`
    ALTER TABLE exceedances
      ADD COLUMN loudest_starts_at INT UNSIGNED NULL
        COMMENT 'of a rolling limit: the loudest of the windows that make it; level and coverage are its' AFTER ends_at,
      ADD COLUMN loudest_ends_at INT UNSIGNED NULL AFTER loudest_starts_at
  `);

export const down = (knex) =>
  knex.raw('ALTER TABLE exceedances DROP COLUMN loudest_ends_at, DROP COLUMN loudest_starts_at');
