import { pool, type Connection } from './connection';

/** What a person is known by, without the address or number itself. */
export interface ContactDigest {
  kind: 'email' | 'phone';
  digest: Buffer;
}

/** Puts a complaint's digests in the place of those before; without any it is marked as looked at. */
export async function writeContactDigests(
  complaint: { id: number; networkId: number },
  digests: readonly ContactDigest[],
  conn: Connection,
): Promise<void> {
  await conn('complaint_contacts').where({ complaint_id: complaint.id }).delete();
  const rows = digests.length > 0 ? digests : [{ kind: 'none', digest: Buffer.alloc(32) }];
  await conn('complaint_contacts').insert(
    rows.map((row) => ({ ...row, complaint_id: complaint.id, network_id: complaint.networkId })),
  );
}

/** Numbers of the complaints of a network that have one of these digests. */
export async function listComplaintsOfContact(
  networkId: number,
  digests: readonly ContactDigest[],
  conn: Connection = pool(),
): Promise<number[]> {
  if (digests.length === 0) return [];
  return conn('complaint_contacts')
    .distinct('complaint_id')
    .where({ network_id: networkId })
    .whereNot({ kind: 'none' })
    .whereIn(
      'digest',
      digests.map(({ digest }) => digest),
    )
    .pluck('complaint_id');
}

/** Complaints with personal data that were never looked at for digests, at most `limit`. */
export async function listWithoutDigests(
  limit: number,
  conn: Connection = pool(),
): Promise<{ id: number; networkId: number }[]> {
  return conn('complaint_private as p')
    .join('complaints as c', 'c.id', 'p.complaint_id')
    .leftJoin('complaint_contacts as d', 'd.complaint_id', 'p.complaint_id')
    .whereNull('d.complaint_id')
    .orderBy('c.id')
    .limit(limit)
    .select({ id: 'c.id', networkId: 'c.network_id' });
}
