export const up = (knex) =>
  knex.raw(`
    CREATE TABLE calendar_feeds (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      user_id CHAR(36) NOT NULL COMMENT 'the feed shows what this person may still see',
      digest BINARY(32) NOT NULL COMMENT 'SHA-256 of the token in the address',
      created_at DATETIME(3) NOT NULL,
      revoked_at DATETIME(3) NULL,
      last_used_at DATETIME(3) NULL,
      UNIQUE KEY calendar_feeds_digest (digest),
      KEY calendar_feeds_person (user_id, network_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('calendar_feeds');
