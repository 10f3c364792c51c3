export const up = (knex) =>
  knex.raw(`
    ALTER TABLE quarter_hours
      ADD COLUMN reason_bits SMALLINT UNSIGNED NOT NULL DEFAULT 0
        COMMENT 'why seconds were left out: bit n is INVALIDITY_REASONS[n]' AFTER flags,
      ADD COLUMN late_sec SMALLINT UNSIGNED NOT NULL DEFAULT 0
        COMMENT 'seconds whose intervals arrived more than an hour after they ended' AFTER reason_bits
  `);

export const down = (knex) =>
  knex.raw('ALTER TABLE quarter_hours DROP COLUMN reason_bits, DROP COLUMN late_sec');
