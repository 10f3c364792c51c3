export const up = (knex) =>
  knex.raw(
    'ALTER TABLE audit_log ADD KEY audit_log_user (user_id, id), ADD KEY audit_log_action (action, id)',
  );

export const down = (knex) =>
  knex.raw('ALTER TABLE audit_log DROP KEY audit_log_user, DROP KEY audit_log_action');
