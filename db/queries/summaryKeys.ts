import { pool, type Connection } from './connection';

/** A network’s key that signs, or signed, its months. */
export interface SummaryKeyRow {
  id: number;
  networkId: number;
  /** Ed25519 public key, SubjectPublicKeyInfo. */
  publicSpki: Buffer;
  /** SHA-256 of it: the key’s name. */
  sha256: Buffer;
  wrappedPrivate: Buffer;
  createdAt: Date;
  /** Null: it signs. */
  retiredAt: Date | null;
}

const COLUMNS = {
  id: 'id',
  networkId: 'network_id',
  publicSpki: 'public_spki',
  sha256: 'sha256',
  wrappedPrivate: 'wrapped_private',
  createdAt: 'created_at',
  retiredAt: 'retired_at',
} as const;

/** Keys of a network, latest first. */
export async function listSummaryKeys(
  networkId: number,
  conn: Connection = pool(),
): Promise<SummaryKeyRow[]> {
  return conn('summary_keys').where({ network_id: networkId }).orderBy('id', 'desc').select(COLUMNS);
}

export async function findSummaryKey(
  sha256: Buffer,
  conn: Connection = pool(),
): Promise<SummaryKeyRow | undefined> {
  return conn('summary_keys').where({ sha256 }).first(COLUMNS);
}

/** Adds the key that signs from now on. A network has one: a second fails with MariaDB’s duplicate-key error. */
export async function insertSummaryKey(
  key: Pick<SummaryKeyRow, 'networkId' | 'publicSpki' | 'sha256' | 'wrappedPrivate'>,
  userId: string | null,
  conn: Connection,
): Promise<void> {
  await conn('summary_keys').insert({
    network_id: key.networkId,
    public_spki: key.publicSpki,
    sha256: key.sha256,
    wrapped_private: key.wrappedPrivate,
    created_by: userId,
    created_at: new Date(),
  });
}

/** Ends what a network signs with now; answers whether there was a key. */
export async function retireSummaryKey(networkId: number, conn: Connection): Promise<boolean> {
  const ended: number = await conn('summary_keys')
    .where({ network_id: networkId, retired_at: null })
    .update({ retired_at: new Date() });
  return ended > 0;
}
