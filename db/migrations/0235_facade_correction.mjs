export const up = (knex) =>
  knex.raw(`
    ALTER TABLE stations
      ADD COLUMN facade_correction_db DOUBLE NOT NULL DEFAULT 3 COMMENT 'as of the newest placement' AFTER placement
  `);

export const down = (knex) => knex.raw('ALTER TABLE stations DROP COLUMN facade_correction_db');
