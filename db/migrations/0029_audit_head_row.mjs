export const up = (knex) =>
  knex('audit_head').insert({ only_row: 1, last_id: 0, last_digest: Buffer.alloc(32) });

export const down = (knex) => knex('audit_head').delete();
