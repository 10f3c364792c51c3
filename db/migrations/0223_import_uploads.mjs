export const up = (knex) =>
  knex.raw(`
    CREATE TABLE import_uploads (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      file_key CHAR(36) NOT NULL COMMENT 'name of the file of its parts in the data directory',
      file_name VARCHAR(160) NOT NULL COMMENT 'as the person called it',
      file_bytes BIGINT UNSIGNED NOT NULL COMMENT 'as announced',
      received_bytes BIGINT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'durable on disk, from the beginning',
      file_digest BINARY(32) NULL COMMENT 'SHA-256 of the unpacked file, where the sender announced it',
      mark VARCHAR(200) NULL COMMENT 'by which the sender finds the upload again',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      touched_at DATETIME(3) NOT NULL,
      import_id INT UNSIGNED NULL COMMENT 'what it became; null: not finished',
      KEY import_uploads_network (network_id, import_id, id),
      KEY import_uploads_touched (touched_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('import_uploads');
