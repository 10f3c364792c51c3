export const up = (knex) =>
  knex.raw(`
    CREATE TABLE second_factors (
      user_id CHAR(36) NOT NULL PRIMARY KEY,
      sealed_secret VARBINARY(255) NOT NULL COMMENT 'sealed under the personal-data key of the settings',
      created_at DATETIME(3) NOT NULL,
      confirmed_at DATETIME(3) NULL COMMENT 'null: begun, and not asked for yet',
      last_step BIGINT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'time step of the last code accepted: none is accepted twice',
      recovery_hashes JSON NOT NULL COMMENT 'argon2 hashes of the recovery codes that are left'
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_bin
  `);

export const down = (knex) => knex.schema.dropTable('second_factors');
