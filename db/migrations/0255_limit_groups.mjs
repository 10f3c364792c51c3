export const up = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      ADD COLUMN group_id INT UNSIGNED NULL COMMENT 'of station_groups, which station_ids were taken from' AFTER station_ids
  `);

export const down = (knex) => knex.raw('ALTER TABLE limit_versions DROP COLUMN group_id');
