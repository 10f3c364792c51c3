import {
  createCipheriv,
  createDecipheriv,
  createHash,
  createPrivateKey,
  createPublicKey,
  generateKeyPairSync,
  randomBytes,
  sign,
  verify,
  type KeyObject,
} from 'node:crypto';
import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import {
  insertSummaryKey,
  listSummaryKeys,
  retireSummaryKey,
  type SummaryKeyRow,
} from '#db/queries/summaryKeys';
import { type SummaryKey } from '#lib/contracts/summaryVerification';
import { config } from '#lib/config/index';
import { purposeMac } from '../../purposeMac';

const NONCE_BYTES = 12;
const TAG_BYTES = 16;

/** The private key does not open: another key stands in the settings, or its bytes were changed. A new key is the way out. */
class SigningKeyUnreadable extends Error {
  constructor(networkId: number, cause: unknown) {
    super(`The signing key of network ${networkId} cannot be opened with the key of the settings.`, {
      cause,
    });
    this.name = 'SigningKeyUnreadable';
  }
}

/** The key that a network signs with; made when there is none yet. */
export async function signingKey(networkId: number): Promise<SummaryKeyRow> {
  const isSigning = ({ retiredAt }: SummaryKeyRow) => retiredAt === null;
  const known = (await listSummaryKeys(networkId)).find(isSigning);
  if (known) return known;
  await inTransaction((transaction) => addKey(networkId, null, transaction)).catch((error: unknown) => {
    // Another worker was first: its key is the network's.
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
  });
  const made = (await listSummaryKeys(networkId)).find(isSigning);
  if (!made) throw new Error(`Network ${networkId} has no signing key.`);
  return made;
}

/** Puts a new key in the place of the one that signs. What the old one signed still holds; it stays published. */
export function rotateSigningKey(networkId: number, userId: string): Promise<void> {
  return inTransaction(async (transaction) => {
    await retireSummaryKey(networkId, transaction);
    await addKey(networkId, userId, transaction);
  });
}

/** Public keys of a network, the one that signs first. */
export async function publicKeys(networkId: number): Promise<SummaryKey[]> {
  return (await listSummaryKeys(networkId)).map(publicKeyJson);
}

/** A key as it is published. */
export function publicKeyJson({ sha256, publicSpki, createdAt, retiredAt }: SummaryKeyRow): SummaryKey {
  return {
    sha256: sha256.toString('hex'),
    pem: publicKeyOf(publicSpki).export({ type: 'spki', format: 'pem' }).toString(),
    createdAt: createdAt.toISOString(),
    retiredAt: retiredAt?.toISOString() ?? null,
  };
}

/** Ed25519 signature of a text’s bytes. @throws {SigningKeyUnreadable} */
export function signWith(key: SummaryKeyRow, text: string): Buffer {
  return sign(null, Buffer.from(text), privateKeyOf(key));
}

/** Whether a signature is that of a text by a public key (SubjectPublicKeyInfo). */
export function isSignedBy(publicSpki: Buffer, text: string, signature: Buffer): boolean {
  return verify(null, Buffer.from(text), publicKeyOf(publicSpki), signature);
}

async function addKey(networkId: number, userId: string | null, transaction: Connection): Promise<void> {
  const { publicKey, privateKey } = generateKeyPairSync('ed25519');
  const publicSpki = publicKey.export({ type: 'spki', format: 'der' });
  const sha256 = createHash('sha256').update(publicSpki).digest();
  const plain = privateKey.export({ type: 'pkcs8', format: 'der' });
  const key = { networkId, publicSpki, sha256, wrappedPrivate: wrapPrivate(networkId, plain) };
  await insertSummaryKey(key, userId, transaction);
  await appendAudit(
    {
      userId,
      networkId,
      action: 'summary-key.make',
      subject: 'signing key',
      detail: { sha256: sha256.toString('hex') },
    },
    transaction,
  );
}

const publicKeyOf = (spki: Buffer) => createPublicKey({ key: spki, type: 'spki', format: 'der' });

function privateKeyOf({ networkId, wrappedPrivate }: SummaryKeyRow): KeyObject {
  try {
    const der = unwrapPrivate(networkId, wrappedPrivate, config().personalDataKey);
    return createPrivateKey({ key: der, type: 'pkcs8', format: 'der' });
  } catch (error) {
    throw new SigningKeyUnreadable(networkId, error);
  }
}

/** The private key that was wrapped under a key of the settings. @throws {Error} where that was another one. */
export function unwrapPrivate(networkId: number, wrappedPrivate: Buffer, root: Buffer): Buffer {
  const nonce = wrappedPrivate.subarray(0, NONCE_BYTES);
  const decipher = createDecipheriv('aes-256-gcm', wrappingKey(networkId, root), nonce, {
    authTagLength: TAG_BYTES,
  });
  decipher.setAuthTag(wrappedPrivate.subarray(NONCE_BYTES, NONCE_BYTES + TAG_BYTES));
  return Buffer.concat([decipher.update(wrappedPrivate.subarray(NONCE_BYTES + TAG_BYTES)), decipher.final()]);
}

/** Wraps a private key under the settings' key. */
export function wrapPrivate(networkId: number, plain: Buffer): Buffer {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv('aes-256-gcm', wrappingKey(networkId, config().personalDataKey), nonce);
  const sealed = Buffer.concat([cipher.update(plain), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]);
}

const wrappingKey = (networkId: number, root: Buffer) =>
  purposeMac('summary signing key', String(networkId), root);
