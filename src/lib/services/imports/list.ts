import { findImport, listImports } from '#db/queries/imports';
import { type Import } from '#lib/contracts/imports';
import { importJson } from './importJson';

/** A page of a network's imports, latest first; `next` is null on the last page. */
export async function importPage(query: {
  networkId: number;
  stationId: number | null;
  limit: number;
  cursor: number[] | null;
}): Promise<{ items: Import[]; next: number[] | null }> {
  const { networkId, stationId, limit, cursor } = query;
  const rows = await listImports(networkId, { limit: limit + 1, beforeId: cursor?.[0] ?? null, stationId });
  const items = rows.slice(0, limit).map(importJson);
  const last = items.at(-1);
  return { items, next: rows.length > limit && last ? [last.id] : null };
}

/** One import of a network; null when there is none of this number. */
export async function importOf(networkId: number, id: number): Promise<Import | null> {
  const row = await findImport(networkId, id);
  return row ? importJson(row) : null;
}
