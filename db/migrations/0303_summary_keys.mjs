export const up = (knex) =>
  knex.raw(`
    CREATE TABLE summary_keys (
      id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
      network_id INT UNSIGNED NOT NULL,
      public_spki VARBINARY(64) NOT NULL COMMENT 'Ed25519 public key, SubjectPublicKeyInfo',
      sha256 BINARY(32) NOT NULL COMMENT 'of public_spki: names the key',
      wrapped_private VARBINARY(200) NOT NULL COMMENT 'AES-256-GCM of the private key under a key of the settings',
      created_by CHAR(36) NULL COMMENT 'null: made at the first issue',
      created_at DATETIME(3) NOT NULL,
      retired_at DATETIME(3) NULL COMMENT 'signs nothing any more; what it signed still holds',
      signing_network_id INT UNSIGNED AS (IF(retired_at IS NULL, network_id, NULL)) PERSISTENT,
      UNIQUE KEY summary_keys_signing (signing_network_id),
      UNIQUE KEY summary_keys_sha256 (sha256),
      KEY summary_keys_network (network_id)
    ) ENGINE = InnoDB DEFAULT CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci
  `);

export const down = (knex) => knex.schema.dropTable('summary_keys');
