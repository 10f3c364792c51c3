import { createHash, randomBytes } from 'node:crypto';
import { mkdir, open, readFile, rename } from 'node:fs/promises';
import { join } from 'node:path';
import { type Certificate } from '#db/queries/calibrations';
import { config } from '#lib/config/index';
import { type CertificateType } from '#lib/contracts/calibrations';

const SIGNATURES: [type: CertificateType, bytes: number[]][] = [
  ['application/pdf', [0x25, 0x50, 0x44, 0x46, 0x2d]],
  ['image/png', [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]],
  ['image/jpeg', [0xff, 0xd8, 0xff]],
];

/** What a file is, by its first bytes and by nothing that its sender says; null: none that is taken. */
export function certificateTypeOf(bytes: Uint8Array): CertificateType | null {
  const found = SIGNATURES.find(([, signature]) => signature.every((byte, at) => bytes[at] === byte));
  return found ? found[0] : null;
}

/**
 * Writes a certificate into the data directory, outside everything that is served, under the name of its own digest. It is
 * durable when the promise resolves.
 */
export async function storeCertificate(bytes: Uint8Array, mediaType: CertificateType): Promise<Certificate> {
  const sha256 = createHash('sha256').update(bytes).digest();
  const path = pathOf(sha256);
  await mkdir(directory(), { recursive: true, mode: 0o700 });
  const unfinished = `${path}.${randomBytes(6).toString('hex')}`;
  const file = await open(unfinished, 'wx', 0o600);
  try {
    await file.writeFile(bytes);
    await file.sync();
  } finally {
    await file.close();
  }
  await rename(unfinished, path);
  return { mediaType, byteCount: bytes.length, sha256 };
}

/** A certificate's bytes; null when the file is gone or is no longer what was uploaded. */
export async function readCertificate(sha256: Buffer): Promise<Buffer | null> {
  try {
    const bytes = await readFile(pathOf(sha256));
    return createHash('sha256').update(bytes).digest().equals(sha256) ? bytes : null;
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') return null;
    throw error;
  }
}

function directory(): string {
  return join(config().dataDir, 'certificates');
}

function pathOf(sha256: Buffer): string {
  return join(directory(), sha256.toString('hex'));
}
