export const up = (knex) =>
  knex.raw(`
    CREATE TABLE calibrations (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      instrument_id INT UNSIGNED NOT NULL,
      station_id INT UNSIGNED NULL COMMENT 'where it stood then; null: in no station',
      checked_at INT UNSIGNED NOT NULL COMMENT 'epoch seconds UTC',
      calibrator VARCHAR(160) NOT NULL DEFAULT '' COMMENT 'kind and serial number in own words',
      calibrator_centi_db SMALLINT NOT NULL COMMENT 'level of the calibrator at 1 kHz',
      before_centi_db SMALLINT NOT NULL COMMENT 'shown before any adjustment',
      after_centi_db SMALLINT NULL COMMENT 'shown after adjustment; null: not adjusted',
      drift_bound_centi_db SMALLINT UNSIGNED NOT NULL COMMENT 'of the network when the check was noted',
      checked_by VARCHAR(160) NOT NULL,
      note VARCHAR(500) NOT NULL DEFAULT '',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_by CHAR(36) NULL,
      withdrawn_at DATETIME(3) NULL,
      withdrawal_reason VARCHAR(500) NULL,
      KEY calibrations_instrument (instrument_id, checked_at),
      KEY calibrations_network (network_id, checked_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('calibrations');
