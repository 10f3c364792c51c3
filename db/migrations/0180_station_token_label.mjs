export const up = (knex) =>
  knex.raw("ALTER TABLE station_tokens ADD COLUMN label VARCHAR(60) NOT NULL DEFAULT '' AFTER digest");

export const down = (knex) => knex.raw('ALTER TABLE station_tokens DROP COLUMN label');
