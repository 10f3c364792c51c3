export const up = (knex) =>
  knex.raw(`
    CREATE TABLE alert_tellings (
      kind ENUM('escalation', 'early-warning') NOT NULL,
      subject VARCHAR(100) NOT NULL COMMENT 'names what was told, once for good',
      told_at DATETIME(3) NOT NULL,
      PRIMARY KEY (kind, subject),
      KEY alert_tellings_age (told_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_bin
  `);

export const down = (knex) => knex.schema.dropTable('alert_tellings');
