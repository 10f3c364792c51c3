import { execFileSync } from 'node:child_process';
import { join } from 'node:path';

export interface Certificate {
  certificate: string;
  key: string;
}

/** A certificate that vouches for itself, for names such as `DNS:localhost,IP:127.0.0.1`, made in a directory for some days. */
export function makeCertificate(
  directory: string,
  commonName: string,
  { names, days }: { names: string; days: number },
): Certificate {
  const made = certificateIn(directory, commonName);
  const kind = ['-x509', '-newkey', 'ec', '-pkeyopt', 'ec_paramgen_curve:prime256v1', '-nodes'];
  const subject = ['-subj', `/CN=${commonName}`, '-addext', `subjectAltName=${names}`, '-days', String(days)];
  const files = ['-keyout', made.key, '-out', made.certificate];
  execFileSync('openssl', ['req', ...kind, ...subject, ...files], { stdio: 'pipe' });
  return made;
}

/** Where a certificate of a name stands. */
export function certificateIn(directory: string, commonName: string): Certificate {
  return { certificate: join(directory, `${commonName}.pem`), key: join(directory, `${commonName}-key.pem`) };
}
