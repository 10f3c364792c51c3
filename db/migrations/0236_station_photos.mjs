export const up = (knex) =>
  knex.raw(`
    CREATE TABLE station_photos (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      station_id INT UNSIGNED NOT NULL,
      taken_on CHAR(10) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL COMMENT 'civil date',
      caption VARCHAR(300) NOT NULL,
      media_type VARCHAR(40) NOT NULL COMMENT 'as the bytes say, not as the sender said',
      byte_count INT UNSIGNED NOT NULL,
      sha256 BINARY(32) NOT NULL COMMENT 'of the file as kept, without its metadata; names it under the data directory',
      uploaded_by CHAR(36) NOT NULL,
      uploaded_at DATETIME(3) NOT NULL,
      KEY station_photos_station (station_id, taken_on),
      KEY station_photos_file (sha256)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('station_photos');
