export const up = (knex) =>
  knex.raw(`
    CREATE TABLE plant_versions (
      plant_id INT UNSIGNED NOT NULL,
      version INT UNSIGNED NOT NULL,
      name VARCHAR(80) NOT NULL,
      kind ENUM('fan', 'pump', 'compressor', 'engine', 'transformer', 'alarm', 'other') NOT NULL,
      latitude DOUBLE NULL,
      longitude DOUBLE NULL,
      minimum_rpm DOUBLE NULL,
      maximum_rpm DOUBLE NULL COMMENT 'equal to the minimum where the speed is fixed',
      blades SMALLINT UNSIGNED NULL,
      poles SMALLINT UNSIGNED NULL COMMENT 'of the motor; an even number',
      cylinders SMALLINT UNSIGNED NULL,
      strokes TINYINT UNSIGNED NULL COMMENT '2 or 4',
      mains_hz DOUBLE NULL,
      tone_hz DOUBLE NULL COMMENT 'a frequency known for itself, as of an alarm',
      weekdays TINYINT UNSIGNED NOT NULL COMMENT 'bit 0 Monday; of the date on which a run begins',
      from_min SMALLINT UNSIGNED NULL COMMENT 'local minutes after midnight; null: all day',
      to_min SMALLINT UNSIGNED NULL,
      notes VARCHAR(1000) NOT NULL DEFAULT '',
      reason VARCHAR(500) NOT NULL DEFAULT '',
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      PRIMARY KEY (plant_id, version)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('plant_versions');
