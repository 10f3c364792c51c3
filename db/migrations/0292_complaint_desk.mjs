export const up = (knex) =>
  knex.raw(`
    ALTER TABLE complaints
      ADD COLUMN area VARCHAR(80) NULL COMMENT 'of the list of the network; coarse, so it may stand open',
      ADD COLUMN assigned_to CHAR(36) NULL COMMENT 'who answers it; null: nobody in particular',
      ADD COLUMN merged_into INT UNSIGNED NULL COMMENT 'the complaint that this one repeats',
      ADD COLUMN merged_from_status ENUM('open', 'answered', 'closed') NULL COMMENT 'what it was before, to be put back when the merge is undone',
      ADD COLUMN first_due_on DATE NULL COMMENT 'of the first answer, once due_on is that of a later one; null: still due_on',
      ADD KEY complaints_merged (merged_into)
  `);

export const down = (knex) =>
  knex.raw(`
    ALTER TABLE complaints
      DROP KEY complaints_merged, DROP COLUMN area, DROP COLUMN assigned_to, DROP COLUMN merged_into,
      DROP COLUMN merged_from_status, DROP COLUMN first_due_on
  `);
