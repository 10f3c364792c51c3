export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_settings (
      network_id INT UNSIGNED NOT NULL PRIMARY KEY,
      answer_days TINYINT UNSIGNED NOT NULL COMMENT 'working days within which a complaint is answered',
      working_weekdays JSON NOT NULL COMMENT '0 Monday to 6 Sunday',
      remind_days TINYINT UNSIGNED NOT NULL COMMENT 'working days before the due date; 0: no reminder beforehand',
      retention_months TINYINT UNSIGNED NOT NULL COMMENT 'after the end of a complaint its personal data are erased',
      place_step_hundredths TINYINT UNSIGNED NOT NULL COMMENT 'of a degree, to which a place is rounded for all but the exact one; 0: not told',
      changed_by CHAR(36) NOT NULL,
      changed_at DATETIME(3) NOT NULL
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_settings');
