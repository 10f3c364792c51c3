import { readFileSync } from 'node:fs';

/** Web and worker may add to these and read them, and nothing else. */
const INSERT_ONLY = ['audit_log', 'issued_summaries', 'issued_summary_files'];
/** One row that names the trail's last act: moved on, never removed. */
const MOVED_ON = ['audit_head'];
/** Partitions of them are made as months come and dropped as they go, by the worker. */
const PARTED = ['interval_levels', 'quarter_hours'];
/** What was migrated is the owner's to say. */
const READ_ONLY = ['schema_migrations', 'schema_migrations_lock'];

/** The rights that the account of web and worker needs on a table. */
export function appRightsOn(table: string): string[] {
  if (INSERT_ONLY.includes(table)) return ['SELECT', 'INSERT'];
  if (MOVED_ON.includes(table)) return ['SELECT', 'UPDATE'];
  if (READ_ONLY.includes(table)) return ['SELECT'];
  const all = ['SELECT', 'INSERT', 'UPDATE', 'DELETE'];
  return PARTED.includes(table) ? [...all, 'ALTER', 'DROP'] : all;
}

/** Every table of today's schema. */
export function schemaTables(): string[] {
  const created = readFileSync('db/schema.sql', 'utf8').matchAll(/^CREATE TABLE `(\w+)`/gm);
  return [...new Set([...[...created].map(([, table = '']) => table), ...READ_ONLY])];
}
