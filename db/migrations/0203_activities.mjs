export const up = (knex) =>
  knex.raw(`
    CREATE TABLE activities (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      kind VARCHAR(60) NOT NULL COMMENT 'in own words: ship at berth',
      place VARCHAR(80) NOT NULL DEFAULT '',
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL,
      note VARCHAR(500) NOT NULL DEFAULT '',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_by CHAR(36) NULL,
      withdrawn_at DATETIME(3) NULL,
      withdrawal_reason VARCHAR(500) NULL,
      KEY activities_time (network_id, starts_at),
      KEY activities_kind (network_id, kind, starts_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('activities');
