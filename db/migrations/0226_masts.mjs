export const up = (knex) =>
  knex.raw(`
    CREATE TABLE masts (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      code VARCHAR(20) NOT NULL,
      name VARCHAR(160) NOT NULL,
      latitude DOUBLE NOT NULL,
      longitude DOUBLE NOT NULL,
      height_m DOUBLE NOT NULL COMMENT 'of the anemometer above ground',
      maximum_age_sec INT UNSIGNED NOT NULL DEFAULT 900 COMMENT 'how far from an interval a record may lie and still tell of it',
      created_at DATETIME(3) NOT NULL,
      retired_at DATETIME(3) NULL,
      UNIQUE KEY masts_code (network_id, code)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('masts');
