export const up = (knex) =>
  knex.raw(`
    CREATE TABLE exceedance_revisions (
      exceedance_id INT UNSIGNED NOT NULL,
      revision INT UNSIGNED NOT NULL,
      at DATETIME(3) NOT NULL,
      state ENUM('standing', 'lifted') NOT NULL,
      limit_version_id INT UNSIGNED NOT NULL,
      ends_at INT UNSIGNED NOT NULL,
      level_db DOUBLE NOT NULL,
      threshold_tenths SMALLINT NOT NULL,
      coverage DOUBLE NOT NULL,
      PRIMARY KEY (exceedance_id, revision)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
      COMMENT = 'what was found each time; never updated'
  `);

export const down = (knex) => knex.schema.dropTable('exceedance_revisions');
