export const up = (knex) =>
  knex.raw(`
    ALTER TABLE quarantine
      MODIFY COLUMN settlement ENUM('released', 'dismissed', 'superseded') NULL
        COMMENT 'superseded: was stored until a released conflict replaced it',
      ADD COLUMN settlement_reason VARCHAR(500) NULL AFTER settlement,
      ADD COLUMN import_id INT UNSIGNED NULL COMMENT 'the import that brought it; null: a post'
  `);

export const down = (knex) =>
  knex.raw(`
    ALTER TABLE quarantine
      DROP COLUMN import_id,
      DROP COLUMN settlement_reason,
      MODIFY COLUMN settlement ENUM('released', 'dismissed') NULL
  `);
