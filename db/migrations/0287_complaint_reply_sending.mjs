export const up = (knex) =>
  knex.raw(`
    ALTER TABLE complaint_replies
      ADD COLUMN items JSON NULL COMMENT 'items of the evidence that went with it; null: sent before there was a choice',
      ADD COLUMN approved_by CHAR(36) NULL,
      ADD COLUMN posted_by CHAR(36) NULL,
      ADD COLUMN posted_on DATE NULL COMMENT 'of a letter on paper'
  `);

export const down = (knex) =>
  knex.raw(`
    ALTER TABLE complaint_replies
      DROP COLUMN items, DROP COLUMN approved_by, DROP COLUMN posted_by, DROP COLUMN posted_on
  `);
