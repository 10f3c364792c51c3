export const up = (knex) =>
  knex.raw(`
    CREATE TABLE audit_log (
      id BIGINT UNSIGNED NOT NULL PRIMARY KEY COMMENT 'gapless: the place in the chain',
      at DATETIME(3) NOT NULL,
      user_id CHAR(36) NULL,
      network_id INT UNSIGNED NULL,
      action VARCHAR(60) NOT NULL,
      subject VARCHAR(160) NOT NULL,
      detail JSON NOT NULL COMMENT 'before and after; for personal tables field names only',
      previous_digest BINARY(32) NOT NULL,
      digest BINARY(32) NOT NULL COMMENT 'SHA-256 over the previous digest and this row',
      KEY audit_log_network (network_id, at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('audit_log');
