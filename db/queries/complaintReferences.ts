import { type ComplaintRow } from './complaints';
import { pool, type Connection } from './connection';

/**
 * References that hold every one of some words (lower case), latest first. Nothing else of a complaint is looked at.
 */
export async function listComplaintReferences(
  networkId: number,
  words: readonly string[],
  limit: number,
  conn: Connection = pool(),
): Promise<Pick<ComplaintRow, 'reference' | 'status'>[]> {
  const query = conn('complaints').where({ network_id: networkId });
  for (const word of words) void query.whereRaw('LOCATE(?, LOWER(reference)) > 0', [word]);
  return query.orderBy('id', 'desc').limit(limit).select('reference', 'status');
}
