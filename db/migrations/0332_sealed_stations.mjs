export const up = (knex) =>
  knex.raw(`
    CREATE TABLE sealed_stations (
      station_id INT UNSIGNED NOT NULL,
      sealed_before INT UNSIGNED NOT NULL COMMENT 'epoch seconds; what is computed of earlier time is never computed anew, and nothing of it is taken or changed',
      kept_from INT UNSIGNED NOT NULL COMMENT 'epoch seconds; single intervals that begin before are no longer kept',
      sealed_at DATETIME(3) NOT NULL COMMENT 'deleting begins a while later, when everybody reads sums instead',
      PRIMARY KEY (station_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('sealed_stations');
