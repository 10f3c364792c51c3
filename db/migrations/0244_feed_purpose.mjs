export const up = (knex) =>
  knex.raw(`
    ALTER TABLE calendar_feeds
      ADD COLUMN purpose ENUM('calendar', 'exceedances') NOT NULL DEFAULT 'calendar' COMMENT 'what the address reads, and nothing else'
  `);

export const down = (knex) => knex.raw('ALTER TABLE calendar_feeds DROP COLUMN purpose');
