export const up = (knex) =>
  knex.raw(
    `ALTER TABLE users ADD COLUMN must_change_password TINYINT(1) NOT NULL DEFAULT 0
       COMMENT 'the password was handed over by somebody else: it opens nothing but the page to change it' AFTER password_hash`,
  );

export const down = (knex) => knex.raw('ALTER TABLE users DROP COLUMN must_change_password');
