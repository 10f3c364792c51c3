export const up = (knex) =>
  knex.raw(`
    ALTER TABLE sessions
      ADD COLUMN last_seen_at DATETIME(3) NULL COMMENT 'to the minute; null: not since it began'
  `);

export const down = (knex) => knex.raw('ALTER TABLE sessions DROP COLUMN last_seen_at');
