export const up = (knex) =>
  knex.raw(`
    ALTER TABLE exceedances
      ADD COLUMN revision INT UNSIGNED NOT NULL DEFAULT 0
        COMMENT 'how often later data or a changed limit changed what was found; each revision is told once'
        AFTER state
  `);

export const down = (knex) => knex.raw('ALTER TABLE exceedances DROP COLUMN revision');
