export const up = (knex) =>
  knex.raw(`
    CREATE TABLE workers (
      id CHAR(36) NOT NULL COMMENT 'of a process; leases are held under it, too',
      name VARCHAR(120) NOT NULL COMMENT 'machine and process number',
      started_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds by the database clock',
      seen_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds by the database clock; refreshed while it lives',
      buckets VARCHAR(200) NOT NULL DEFAULT '' COMMENT 'of stations that it computes, with commas',
      PRIMARY KEY (id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('workers');
