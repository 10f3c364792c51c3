import { createHash } from 'node:crypto';
import { findIssuedByDigest, listIssued, type IssuedSummaryRow } from '#db/queries/issuedSummaries';
import { findNetworkById } from '#db/queries/networks';
import { findSummaryKey, listSummaryKeys, type SummaryKeyRow } from '#db/queries/summaryKeys';
import { summaryManifestSchema, type SummaryManifest } from '#lib/contracts/summaryManifest';
import { type Verification } from '#lib/contracts/summaryVerification';
import { isSignedBy, publicKeyJson } from './keys';

type Match = Verification['matches'][number];

/** What is known of a digest (32 bytes). Nothing is believed but what the signed manifest says. */
export async function verifyDigest(sha256: Buffer): Promise<Verification> {
  const text = sha256.toString('hex');
  const found = await findIssuedByDigest(sha256);
  const matches: Match[] = [];
  for (const { summary, file } of found) {
    const match = await matchOf(summary, file?.name ?? null, text);
    if (match) matches.push(match);
  }
  return { sha256: text, verdict: verdictOf(matches), matches };
}

/** The manifest of an issued revision with the key that it names; null where the stored record does not hold. */
export async function openManifest(
  row: Pick<IssuedSummaryRow, 'manifest' | 'manifestSha256' | 'signature' | 'month' | 'revision'>,
): Promise<{ manifest: SummaryManifest; key: SummaryKeyRow } | null> {
  const digest = createHash('sha256').update(row.manifest).digest();
  const parsed = parse(row.manifest);
  if (!parsed || !digest.equals(row.manifestSha256)) return null;
  const key = await findSummaryKey(Buffer.from(parsed.publicKey, 'hex'));
  if (!key || !isSignedBy(key.publicSpki, row.manifest, row.signature)) return null;
  return parsed.month === row.month && parsed.revision === row.revision ? { manifest: parsed, key } : null;
}

async function matchOf(row: IssuedSummaryRow, file: string | null, sha256: string): Promise<Match | null> {
  const network = await findNetworkById(row.networkId);
  const key = (await listSummaryKeys(row.networkId)).find(({ id }) => id === row.keyId);
  if (!network || !key) return null;
  const opened = await openManifest(row);
  const isNamed = file === null || (opened?.manifest.files.some((one) => one.sha256 === sha256) ?? false);
  const [latest] = await listIssued(row.networkId, row.month);
  return {
    network: { slug: network.slug, name: network.name },
    month: row.month,
    revision: row.revision,
    latestRevision: latest?.revision ?? row.revision,
    issuedAt: row.issuedAt.toISOString(),
    issuedBy: row.issuedByName,
    file,
    manifestSha256: row.manifestSha256.toString('hex'),
    signature: row.signature.toString('base64'),
    publicKey: publicKeyJson(key),
    isSealIntact: opened !== null && isNamed,
  };
}

function parse(text: string): SummaryManifest | null {
  try {
    return summaryManifestSchema.parse(JSON.parse(text));
  } catch {
    return null;
  }
}

function verdictOf(matches: readonly Match[]): Verification['verdict'] {
  const intact = matches.filter(({ isSealIntact }) => isSealIntact);
  if (matches.length === 0) return 'unknown';
  if (intact.length === 0) return 'damaged';
  return intact.some(({ revision, latestRevision }) => revision === latestRevision) ? 'issued' : 'superseded';
}
