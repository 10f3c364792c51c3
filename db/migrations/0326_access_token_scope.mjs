export const up = (knex) =>
  knex.raw(`
    ALTER TABLE access_tokens
      ADD COLUMN access ENUM('read', 'change') NOT NULL DEFAULT 'change' COMMENT 'read: GET alone',
      ADD COLUMN families JSON NULL COMMENT 'families of routes that it opens; null: all'
  `);

export const down = (knex) => knex.raw('ALTER TABLE access_tokens DROP COLUMN access, DROP COLUMN families');
