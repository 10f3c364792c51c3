export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaints (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      reference VARCHAR(32) NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL,
      kind VARCHAR(40) NOT NULL COMMENT 'what it sounds like, from a list; own words are personal and stand apart',
      coarse_latitude DOUBLE NULL COMMENT 'rounded to 0.01 degree; the exact place stands apart',
      coarse_longitude DOUBLE NULL,
      nearest_station_id INT UNSIGNED NULL,
      status ENUM('open', 'answered', 'closed') NOT NULL DEFAULT 'open',
      due_on DATE NOT NULL,
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      answered_at DATETIME(3) NULL,
      UNIQUE KEY complaints_reference (reference),
      KEY complaints_network (network_id, created_at),
      KEY complaints_due (network_id, status, due_on)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaints');
