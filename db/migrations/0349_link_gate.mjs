/** One row, which every transaction that writes holds shared while links to data servers are not being changed (db/sharding/linkGate.ts). */
export const up = async (knex) => {
  await knex.raw(
    'CREATE TABLE link_gate (id TINYINT UNSIGNED NOT NULL, PRIMARY KEY (id)) ENGINE = InnoDB CHARSET = utf8mb4 COLLATE = utf8mb4_uca1400_ai_ci',
  );
  await knex.raw('INSERT INTO link_gate (id) VALUES (1)');
};

export const down = (knex) => knex.raw('DROP TABLE link_gate');
