export const up = (knex) =>
  knex.raw(`
    ALTER TABLE networks
      ADD COLUMN second_factor_required BOOLEAN NOT NULL DEFAULT FALSE COMMENT 'a browser without one is let in nowhere'
  `);

export const down = (knex) => knex.raw('ALTER TABLE networks DROP COLUMN second_factor_required');
