export const up = (knex) =>
  knex.raw(`
    INSERT INTO exceedance_revisions
      (exceedance_id, revision, at, state, limit_version_id, ends_at, level_db, threshold_tenths, coverage)
    SELECT id, revision, COALESCE(revised_at, detected_at), state, limit_version_id, ends_at, level_db,
      threshold_tenths, coverage
    FROM exceedances
  `);

export const down = (knex) => knex('exceedance_revisions').delete();
