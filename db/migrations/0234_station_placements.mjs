export const up = (knex) =>
  knex.raw(`
    CREATE TABLE station_placements (
      station_id INT UNSIGNED NOT NULL,
      effective_from INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      placement ENUM('free-field', 'facade') NOT NULL,
      facade_correction_db DOUBLE NOT NULL COMMENT 'taken off levels measured at a facade, when reporting incident sound',
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      PRIMARY KEY (station_id, effective_from)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
      COMMENT = 'a station without a row has stood as its own row says ever since'
  `);

export const down = (knex) => knex.schema.dropTable('station_placements');
