export const up = (knex) =>
  knex.raw(`
    CREATE TABLE report_attempts (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      address_digest BINARY(16) NOT NULL COMMENT 'keyed digest of the address and the day: it tells nobody where a report came from',
      at DATETIME(3) NOT NULL,
      KEY report_attempts_network (network_id, at)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('report_attempts');
