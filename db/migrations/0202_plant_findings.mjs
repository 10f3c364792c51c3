export const up = (knex) =>
  knex.raw(`
    CREATE TABLE plant_findings (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      starts_at INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL,
      plant_id INT UNSIGNED NOT NULL,
      plant_version INT UNSIGNED NOT NULL COMMENT 'as the plant was noted then',
      verdict ENUM('confirmed', 'rejected') NOT NULL,
      named_because VARCHAR(1000) NOT NULL DEFAULT '' COMMENT 'the words that named it; empty: nothing did',
      note VARCHAR(500) NOT NULL DEFAULT '',
      decided_by CHAR(36) NOT NULL,
      decided_at DATETIME(3) NOT NULL,
      KEY plant_findings_station (station_id, starts_at),
      KEY plant_findings_plant (plant_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('plant_findings');
