export const up = (knex) =>
  knex.raw(
    `ALTER TABLE audit_log ADD COLUMN from_address VARCHAR(45) NULL
       COMMENT 'where a signed-in person acted from; null: Bittern itself, a monitor, a resident' AFTER user_id`,
  );

export const down = (knex) => knex.raw('ALTER TABLE audit_log DROP COLUMN from_address');
