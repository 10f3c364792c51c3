export const up = (knex) =>
  knex.raw(`
    CREATE TABLE alert_items (
      id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      recipient VARCHAR(254) NOT NULL,
      exceedance_id INT UNSIGNED NOT NULL,
      item_key VARCHAR(120) NOT NULL COMMENT 'a revision of an exceedance, told once a recipient',
      words JSON NOT NULL COMMENT 'what is told, as it stood then',
      due_at DATETIME(3) NOT NULL COMMENT 'when a message takes it up',
      told_at DATETIME(3) NULL COMMENT 'null: no message has taken it up yet',
      created_at DATETIME(3) NOT NULL,
      UNIQUE KEY alert_items_once (recipient, item_key),
      KEY alert_items_due (told_at, due_at),
      KEY alert_items_recipient (network_id, recipient, told_at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('alert_items');
