export const up = (knex) =>
  knex.raw(`
    CREATE TABLE imports (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NOT NULL,
      state ENUM('mapping', 'checking', 'checked', 'storing', 'stored', 'undoing', 'undone', 'redoing',
        'discarding', 'discarded', 'failed') NOT NULL,
      problem VARCHAR(500) NULL COMMENT 'why it failed, or why a redo was refused',
      file_key CHAR(36) NOT NULL COMMENT 'name of the file in the data directory',
      file_name VARCHAR(160) NOT NULL COMMENT 'as the person called it',
      file_bytes BIGINT UNSIGNED NOT NULL,
      file_digest BINARY(32) NOT NULL,
      mapping LONGTEXT NULL COMMENT 'JSON: what each column is',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      bytes_done BIGINT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'of the file, up to the last chunk that was committed',
      lines_done INT UNSIGNED NOT NULL DEFAULT 0,
      start_done INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'how far an undo or the check before a redo has come, epoch seconds',
      report LONGTEXT NOT NULL COMMENT 'JSON: counts and first examples of the check',
      stored_count INT UNSIGNED NOT NULL DEFAULT 0,
      late_known_count INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'accepted by the check, stored by somebody else before the import came to it',
      late_refused_count INT UNSIGNED NOT NULL DEFAULT 0,
      acted_by CHAR(36) NULL COMMENT 'who stored, undid, redid or discarded it last',
      acted_at DATETIME(3) NULL,
      act_reason VARCHAR(500) NULL,
      finished_at DATETIME(3) NULL,
      KEY imports_network (network_id, id),
      KEY imports_state (state, id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('imports');
