import { execFileSync } from 'node:child_process';
import { join } from 'node:path';

export interface MadeCertificate {
  certificate: string;
  key: string;
}

/** A certificate that vouches for itself, for names such as `DNS:localhost,IP:127.0.0.1`, made in a directory. */
export function makeCertificate(directory: string, commonName: string, names: string): MadeCertificate {
  const made = {
    certificate: join(directory, `${commonName}.pem`),
    key: join(directory, `${commonName}-key.pem`),
  };
  const kind = ['-x509', '-newkey', 'ec', '-pkeyopt', 'ec_paramgen_curve:prime256v1', '-nodes', '-days', '2'];
  const subject = ['-subj', `/CN=${commonName}`, '-addext', `subjectAltName=${names}`];
  const files = ['-keyout', made.key, '-out', made.certificate];
  execFileSync('openssl', ['req', ...kind, ...subject, ...files], { stdio: 'pipe' });
  return made;
}
