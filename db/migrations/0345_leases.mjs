export const up = (knex) =>
  knex.raw(`
    CREATE TABLE leases (
      name VARCHAR(120) NOT NULL COMMENT 'what is done by one process at a time',
      holder CHAR(36) NOT NULL COMMENT 'of a process',
      taken_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds by the database clock',
      expires_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds by the database clock; renewed while it is held',
      PRIMARY KEY (name)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('leases');
