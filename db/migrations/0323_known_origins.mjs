export const up = (knex) =>
  knex.raw(`
    CREATE TABLE known_origins (
      user_id CHAR(36) NOT NULL,
      kind ENUM('device', 'address', 'place') NOT NULL COMMENT 'place: a browser at an address',
      digest BINARY(32) NOT NULL,
      first_at DATETIME(3) NOT NULL,
      last_at DATETIME(3) NOT NULL,
      PRIMARY KEY (user_id, kind, digest),
      KEY known_origins_age (last_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_bin
  `);

export const down = (knex) => knex.schema.dropTable('known_origins');
