import { type Certificate } from '#db/queries/calibrations';
import { type CertificateType } from '#lib/contracts/calibrations';
import { keepFile, readKeptFile } from '../files/keptFile';

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

/** Keeps a certificate in the data directory; durable when the promise resolves. */
export async function storeCertificate(bytes: Uint8Array, mediaType: CertificateType): Promise<Certificate> {
  return { mediaType, byteCount: bytes.length, sha256: await keepFile('certificates', bytes) };
}

/** A certificate's bytes; null when the file is gone or is no longer what was uploaded. */
export function readCertificate(sha256: Buffer): Promise<Buffer | null> {
  return readKeptFile('certificates', sha256);
}
