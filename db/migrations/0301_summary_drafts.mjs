export const up = (knex) =>
  knex.raw(`
    CREATE TABLE summary_drafts (
      network_id INT UNSIGNED NOT NULL,
      month CHAR(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
      revision SMALLINT UNSIGNED NOT NULL,
      state ENUM('draft', 'review', 'issuing', 'issued') NOT NULL DEFAULT 'draft',
      drafted_at DATETIME(3) NOT NULL,
      computed_at DATETIME(3) NULL COMMENT 'null: its figures wait to be made',
      document_sha256 BINARY(32) NULL COMMENT 'names the figures under the data directory',
      data_sha256 BINARY(32) NULL COMMENT 'digest of the intervals that the figures are of',
      figures JSON NULL COMMENT 'levels of the month by station',
      progress SMALLINT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'stations done of the computation under way',
      failure VARCHAR(500) NULL COMMENT 'why the last attempt came to nothing',
      submitted_by CHAR(36) NULL,
      submitted_at DATETIME(3) NULL,
      requested_by CHAR(36) NULL COMMENT 'who issues it',
      requested_at DATETIME(3) NULL,
      note VARCHAR(1000) NOT NULL DEFAULT '' COMMENT 'what whoever issues it says about it',
      proposal_id INT UNSIGNED NULL COMMENT 'what led to a revision',
      fingerprint BINARY(32) NULL COMMENT 'of an issued one: what it rests on, when it was compared last',
      fingerprint_at DATETIME(3) NULL,
      PRIMARY KEY (network_id, month, revision),
      KEY summary_drafts_state (state, computed_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('summary_drafts');
