export const up = (knex) =>
  knex.raw(`
    CREATE TABLE summary_comments (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      month CHAR(7) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL,
      revision SMALLINT UNSIGNED NOT NULL,
      body VARCHAR(2000) NOT NULL,
      created_by CHAR(36) NOT NULL,
      created_at DATETIME(3) NOT NULL,
      withdrawn_at DATETIME(3) NULL,
      KEY summary_comments_month (network_id, month)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('summary_comments');
