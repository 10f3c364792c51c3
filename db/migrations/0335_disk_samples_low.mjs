export const up = (knex) =>
  knex.raw(
    `ALTER TABLE disk_samples ADD COLUMN is_low TINYINT(1) NOT NULL DEFAULT 0
       COMMENT 'little room then, so that operators were told; since when is the first of those without one between that is not'`,
  );

export const down = (knex) => knex.raw('ALTER TABLE disk_samples DROP COLUMN is_low');
