export const up = (knex) =>
  knex.raw(`
    CREATE TABLE complaint_contacts (
      complaint_id INT UNSIGNED NOT NULL,
      network_id INT UNSIGNED NOT NULL,
      kind ENUM('email', 'phone', 'none') NOT NULL COMMENT 'none: looked at, and there is nothing to know the person by',
      digest BINARY(32) NOT NULL COMMENT 'keyed digest of the address or number in this network: alike for the same one, and not to be turned back',
      PRIMARY KEY (complaint_id, kind),
      KEY complaint_contacts_digest (network_id, digest)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('complaint_contacts');
