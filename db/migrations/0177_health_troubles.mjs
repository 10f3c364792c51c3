export const up = (knex) =>
  knex.raw(`
    CREATE TABLE health_troubles (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      kind VARCHAR(24) NOT NULL,
      begins_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      noticed_at DATETIME(3) NOT NULL,
      measured DOUBLE NULL COMMENT 'what was found last, in the unit of the kind',
      bound DOUBLE NULL COMMENT 'what it was held against, in the same unit',
      fine_since INT UNSIGNED NULL COMMENT 'seems over since then; told when it has stayed so',
      ends_at INT UNSIGNED NULL COMMENT 'null: not over',
      is_open TINYINT UNSIGNED NULL DEFAULT 1 COMMENT '1, or null when over: one open trouble a station and kind',
      UNIQUE KEY health_troubles_open (station_id, kind, is_open),
      KEY health_troubles_network (network_id, begins_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('health_troubles');
