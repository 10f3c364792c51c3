export const up = (knex) =>
  knex.raw(`
    ALTER TABLE sessions
      ADD COLUMN from_address VARCHAR(45) NULL COMMENT 'network address that signed in, for its owner to recognise',
      ADD COLUMN agent VARCHAR(255) NULL COMMENT 'what the browser said it is'
  `);

export const down = (knex) => knex.raw('ALTER TABLE sessions DROP COLUMN from_address, DROP COLUMN agent');
