export const up = (knex) =>
  knex.raw(`
    ALTER TABLE exceedances
      ADD COLUMN cause_detail VARCHAR(160) NULL
        COMMENT 'the cause in own words; cause holds a word of the list'
        AFTER cause
  `);

export const down = (knex) => knex.raw('ALTER TABLE exceedances DROP COLUMN cause_detail');
