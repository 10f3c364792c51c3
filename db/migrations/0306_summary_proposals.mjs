export const up = (knex) =>
  knex.raw(`
    CREATE TABLE summary_proposals (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      month CHAR(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
      of_revision SMALLINT UNSIGNED NOT NULL COMMENT 'the issued revision whose figures differ',
      changes_sha256 BINARY(32) NOT NULL COMMENT 'of the changes: the same ones are proposed once',
      changes JSON NOT NULL COMMENT 'station, figure, old, new, why',
      found_at DATETIME(3) NOT NULL,
      state ENUM('open', 'accepted', 'dismissed', 'replaced') NOT NULL DEFAULT 'open',
      decided_by CHAR(36) NULL,
      decided_at DATETIME(3) NULL,
      reason VARCHAR(500) NULL,
      UNIQUE KEY summary_proposals_changes (network_id, month, of_revision, changes_sha256)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('summary_proposals');
