export const up = (knex) =>
  knex.raw(`
    ALTER TABLE complaints
      ADD COLUMN closed_at DATETIME(3) NULL,
      ADD COLUMN closing_reason VARCHAR(40) NULL COMMENT 'from a list: a reason in own words could name somebody'
  `);

export const down = (knex) =>
  knex.raw('ALTER TABLE complaints DROP COLUMN closed_at, DROP COLUMN closing_reason');
