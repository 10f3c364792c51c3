export const up = (knex) =>
  knex.raw(`
    ALTER TABLE exclusions
      ADD COLUMN act_id INT UNSIGNED NULL COMMENT 'first exclusion of those that one act made at several stations; null: made alone',
      ADD KEY exclusions_act (network_id, act_id)
  `);

export const down = (knex) => knex.raw('ALTER TABLE exclusions DROP KEY exclusions_act, DROP COLUMN act_id');
