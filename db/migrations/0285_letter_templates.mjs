export const up = (knex) =>
  knex.raw(`
    CREATE TABLE letter_templates (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      template INT UNSIGNED NOT NULL COMMENT 'number of the template in its network, the same in all its versions',
      version INT UNSIGNED NOT NULL,
      name VARCHAR(120) NOT NULL,
      body TEXT NOT NULL COMMENT 'text with fields such as {{laeq}}',
      is_withdrawn TINYINT(1) NOT NULL DEFAULT 0 COMMENT 'this version withdraws the template',
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY letter_templates_version (network_id, template, version)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('letter_templates');
