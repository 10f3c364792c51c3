export const up = (knex) => knex.raw('ALTER TABLE quarantine ADD KEY quarantine_import (import_id, id)');

export const down = (knex) => knex.raw('ALTER TABLE quarantine DROP KEY quarantine_import');
