export const up = (knex) =>
  knex.raw(`
    CREATE TABLE instruments (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      serial_number VARCHAR(60) NOT NULL,
      class TINYINT UNSIGNED NOT NULL COMMENT '1 or 2 of IEC 61672-1',
      description VARCHAR(160) NOT NULL DEFAULT '',
      microphone VARCHAR(160) NOT NULL DEFAULT '' COMMENT 'type and serial number in own words',
      created_by CHAR(36) NULL,
      created_at DATETIME(3) NOT NULL,
      retired_at DATETIME(3) NULL,
      UNIQUE KEY instruments_serial (network_id, serial_number)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('instruments');
