/** What there is up to the end of this month stays together; the worker splits off the months that follow before they begin. */
export const up = (knex) => {
  const now = new Date();
  const nextMonthSec = Date.UTC(now.getUTCFullYear(), now.getUTCMonth() + 1) / 1000;
  return knex.raw(
    `ALTER TABLE interval_levels PARTITION BY RANGE (starts_at) (
       PARTITION p_before VALUES LESS THAN (${nextMonthSec}),
       PARTITION p_open VALUES LESS THAN MAXVALUE)`,
  );
};

export const down = (knex) => knex.raw('ALTER TABLE interval_levels REMOVE PARTITIONING');
