export const up = async (knex) => {
  await knex.raw(`
    CREATE TABLE IF NOT EXISTS station_locks (
      station_id INT UNSIGNED NOT NULL,
      PRIMARY KEY (station_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
      COMMENT = 'a row is locked by whoever changes what is measured or computed of its station'
  `);
  await knex.raw('INSERT IGNORE INTO station_locks (station_id) SELECT id FROM stations');
};

export const down = (knex) => knex.schema.dropTable('station_locks');
