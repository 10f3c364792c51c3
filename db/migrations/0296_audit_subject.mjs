export const up = (knex) => knex.raw('ALTER TABLE audit_log ADD KEY audit_log_subject (subject, id)');

export const down = (knex) => knex.raw('ALTER TABLE audit_log DROP KEY audit_log_subject');
