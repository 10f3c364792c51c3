import {
  countQuarantined,
  findQuarantined,
  listQuarantined,
  type QuarantineFilter,
} from '#db/queries/quarantine';
import { type Quarantined, type QuarantinedRecord } from '#lib/contracts/quarantine';
import { quarantineJson, quarantineRecordJson } from './quarantineJson';

/** A page of a network's refused records, latest kept first; `next` is null on the last page. */
export async function quarantinePage(
  filter: QuarantineFilter,
  limit: number,
  cursor: number[] | null,
): Promise<{ items: Quarantined[]; next: number[] | null }> {
  const rows = await listQuarantined(filter, { limit: limit + 1, beforeId: cursor?.[0] ?? null });
  const items = rows.slice(0, limit).map(quarantineJson);
  const last = items.at(-1);
  return { items, next: rows.length > limit && last ? [last.id] : null };
}

/** How many records match a filter. */
export function quarantineCount(filter: QuarantineFilter): Promise<number> {
  return countQuarantined(filter);
}

/** One record of a network as it was received; null when there is none of this number. */
export async function quarantinedRecord(networkId: number, id: number): Promise<QuarantinedRecord | null> {
  const row = await findQuarantined(networkId, id);
  return row ? quarantineRecordJson(row) : null;
}
