export const up = (knex) =>
  knex.raw('ALTER TABLE limits ADD COLUMN withdrawal_reason VARCHAR(500) NULL AFTER withdrawn_by');

export const down = (knex) => knex.raw('ALTER TABLE limits DROP COLUMN withdrawal_reason');
