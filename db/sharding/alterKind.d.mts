import type { Knex } from 'knex';

export function alterKind(knex: Knex, kind: string, change: string): Promise<void>;
