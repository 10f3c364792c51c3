export const up = (knex) =>
  knex.raw(`
    ALTER TABLE limit_versions
      ADD COLUMN wind_rule JSON NULL COMMENT 'which wind intervals must have to count, and which dismisses a window' AFTER minimum_coverage
  `);

export const down = (knex) => knex.raw('ALTER TABLE limit_versions DROP COLUMN wind_rule');
