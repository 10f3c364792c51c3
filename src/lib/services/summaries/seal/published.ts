import { findNetworkBySlug } from '#db/queries/networks';
import { findSummaryKey } from '#db/queries/summaryKeys';
import { type SummaryKey } from '#lib/contracts/summaryVerification';
import { publicKeyJson, publicKeys } from './keys';

/** Public keys of a network by its slug, for anybody; null where nothing was ever signed, so that it tells of no other networks. */
export async function publishedKeys(slug: string): Promise<SummaryKey[] | null> {
  const network = await findNetworkBySlug(slug);
  const keys = network ? await publicKeys(network.id) : [];
  return keys.length > 0 ? keys : null;
}

/** A public key by its digest, for anybody. */
export async function publishedKey(sha256: Buffer): Promise<SummaryKey | null> {
  const key = await findSummaryKey(sha256);
  return key ? publicKeyJson(key) : null;
}
