export const up = (knex) =>
  knex.raw(`
    CREATE TABLE users (
      id CHAR(36) NOT NULL PRIMARY KEY,
      email VARCHAR(254) NOT NULL,
      name VARCHAR(160) NOT NULL,
      password_hash VARCHAR(255) NOT NULL,
      is_administrator BOOLEAN NOT NULL DEFAULT FALSE,
      created_at DATETIME(3) NOT NULL,
      disabled_at DATETIME(3) NULL,
      UNIQUE KEY users_email (email)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('users');
