export const up = (knex) =>
  knex.raw(`
    CREATE TABLE issued_summaries (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      month CHAR(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
      revision SMALLINT UNSIGNED NOT NULL,
      issued_by CHAR(36) NOT NULL,
      issued_by_name VARCHAR(160) NOT NULL COMMENT 'as it stands in the files',
      issued_at DATETIME(3) NOT NULL,
      note VARCHAR(1000) NOT NULL,
      figures JSON NOT NULL COMMENT 'levels of the month by station',
      changes JSON NULL COMMENT 'figures that differ from the revision before; null: the first',
      key_id INT UNSIGNED NOT NULL,
      manifest MEDIUMTEXT NOT NULL COMMENT 'the very text that is signed',
      manifest_sha256 BINARY(32) NOT NULL,
      signature BINARY(64) NOT NULL COMMENT 'Ed25519 of the manifest',
      UNIQUE KEY issued_summaries_revision (network_id, month, revision),
      KEY issued_summaries_manifest (manifest_sha256)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('issued_summaries');
