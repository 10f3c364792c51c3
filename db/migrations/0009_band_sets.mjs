export const up = (knex) =>
  knex.raw(`
    CREATE TABLE band_sets (
      id SMALLINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      fraction TINYINT UNSIGNED NOT NULL,
      band_indices VARCHAR(160) NOT NULL COMMENT 'ascending, comma separated',
      UNIQUE KEY band_sets_bands (fraction, band_indices)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('band_sets');
