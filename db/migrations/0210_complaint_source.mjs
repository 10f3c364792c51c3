export const up = (knex) =>
  knex.raw(`
    ALTER TABLE complaints
      ADD COLUMN source ENUM('desk', 'resident') NOT NULL DEFAULT 'desk' COMMENT 'who wrote it down: the liaison, or the resident on the public form'
  `);

export const down = (knex) => knex.raw('ALTER TABLE complaints DROP COLUMN source');
