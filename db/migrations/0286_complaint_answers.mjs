export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_answers (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      complaint_id INT UNSIGNED NOT NULL,
      state ENUM('draft', 'submitted', 'sent', 'withdrawn') NOT NULL DEFAULT 'draft',
      revision INT UNSIGNED NOT NULL DEFAULT 1 COMMENT 'counts each keeping, so that of two writers the second is told',
      ciphertext MEDIUMBLOB NOT NULL COMMENT 'AES-256-GCM of the JSON: the text with its fields',
      items JSON NOT NULL COMMENT 'items of the evidence that go with it',
      template_version_id INT UNSIGNED NULL,
      author CHAR(36) NOT NULL COMMENT 'who wrote it last',
      figures_digest CHAR(64) NULL COMMENT 'of the figures that were submitted',
      submitted_at DATETIME(3) NULL,
      decided_by CHAR(36) NULL,
      decided_at DATETIME(3) NULL,
      reply_id INT UNSIGNED NULL,
      created_at DATETIME(3) NOT NULL,
      updated_at DATETIME(3) NOT NULL,
      open_complaint_id INT UNSIGNED AS (IF(state IN ('draft', 'submitted'), complaint_id, NULL)) PERSISTENT,
      UNIQUE KEY complaint_answers_open (open_complaint_id),
      KEY complaint_answers_complaint (complaint_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_answers');
