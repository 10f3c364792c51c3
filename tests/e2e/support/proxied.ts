import { execFileSync, spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { inject } from 'vitest';
import { untilAnswers } from '#ops/start/untilAnswers';
import { WEB_ARGUMENTS } from '#ops/start/webArguments';

export const PROXY_NAME = 'noise.merrow.example';
/** What the proxied web takes as a file; less than the demo's, so that a test needs no gigabyte. */
export const PROXIED_IMPORT_MIB = 24;

export interface Proxied {
  httpPort: number;
  httpsPort: number;
  /** The certificate that nginx shows, made for this run. */
  certificate: string;
  stopWeb(): Promise<void>;
  stop(): Promise<void>;
}

/** nginx with the configuration that is shipped, in front of another web of the running Bittern that has its public address. */
export async function startProxied(): Promise<Proxied> {
  const directory = mkdtempSync(join(tmpdir(), 'bittern-proxy-'));
  const [webPort, httpPort, httpsPort] = await freePorts();
  const web = spawn(process.execPath, [...WEB_ARGUMENTS, 'ops/http/server.ts'], {
    env: { ...process.env, ...webSettings(webPort) },
    stdio: 'ignore',
  });
  makeCertificate(directory);
  const configuration = join(directory, 'nginx.conf');
  writeFileSync(configuration, nginxConfiguration(directory, { webPort, httpPort, httpsPort }));
  execFileSync('nginx', ['-t', '-c', configuration, '-p', directory], { stdio: 'pipe' });
  const nginx = spawn('nginx', ['-c', configuration, '-p', directory], { stdio: 'ignore' });
  const stopWeb = () => ended(web, 'SIGKILL');
  await untilAnswers(`http://127.0.0.1:${webPort}/readyz`, 60_000);
  return {
    httpPort,
    httpsPort,
    certificate: readFileSync(join(directory, 'certificate.pem'), 'utf8'),
    stopWeb,
    stop: async () => {
      await Promise.all([stopWeb(), ended(nginx, 'SIGTERM')]);
      rmSync(directory, { recursive: true, force: true });
    },
  };
}

async function ended(child: ChildProcess, signal: NodeJS.Signals): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const exit = once(child, 'exit');
  child.kill(signal);
  await exit;
}

function webSettings(port: number): Record<string, string> {
  const dataDirectory = inject('dataDirectory');
  const secrets = readFileSync(join(dataDirectory, 'secrets.env'), 'utf8').trim().split('\n');
  return {
    ...Object.fromEntries(secrets.map((line) => line.split('=') as [string, string])),
    BITTERN_DATA_DIR: dataDirectory,
    BITTERN_DB_USER: 'bittern',
    BITTERN_DB_PORT: String(inject('databasePort')),
    BITTERN_DB_MIGRATE: 'false',
    BITTERN_PORT: String(port),
    BITTERN_ORIGIN: `https://${PROXY_NAME}`,
    BITTERN_TRUSTED_PROXIES: '127.0.0.1',
    BITTERN_IMPORT_MAX_MIB: String(PROXIED_IMPORT_MIB),
  };
}

function makeCertificate(directory: string): void {
  const subject = ['-subj', `/CN=${PROXY_NAME}`, '-addext', `subjectAltName=DNS:${PROXY_NAME}`];
  const files = ['-keyout', join(directory, 'key.pem'), '-out', join(directory, 'certificate.pem')];
  const kind = ['-x509', '-newkey', 'ec', '-pkeyopt', 'ec_paramgen_curve:prime256v1', '-nodes', '-days', '2'];
  execFileSync('openssl', ['req', ...kind, ...subject, ...files], { stdio: 'pipe' });
}

/** The shipped file with this run's ports and certificate, and around it what Debian's own nginx.conf has. */
function nginxConfiguration(
  directory: string,
  { webPort, httpPort, httpsPort }: { webPort: number; httpPort: number; httpsPort: number },
): string {
  const server = readFileSync('ops/proxy/nginx.conf', 'utf8')
    .replaceAll(/^ *listen \[::\].*$/gm, '')
    .replace('listen 80;', `listen 127.0.0.1:${httpPort};`)
    .replace('listen 443 ', `listen 127.0.0.1:${httpsPort} `)
    .replace('127.0.0.1:4321;', `127.0.0.1:${webPort};`)
    .replace(/ssl_certificate .*;/, `ssl_certificate ${directory}/certificate.pem;`)
    .replace(/ssl_certificate_key .*;/, `ssl_certificate_key ${directory}/key.pem;`);
  const kinds = ['client_body', 'proxy', 'fastcgi', 'uwsgi', 'scgi'];
  for (const kind of kinds) mkdirSync(join(directory, kind));
  return `daemon off;
${process.getuid?.() === 0 ? 'user root;' : ''}
pid ${directory}/nginx.pid;
error_log ${directory}/error.log;
events {}
http {
  access_log off;
  ${kinds.map((kind) => `${kind}_temp_path ${directory}/${kind};`).join('\n  ')}
${server}
}
`;
}

async function freePorts(): Promise<[number, number, number]> {
  const probes = [createServer(), createServer(), createServer()] as const;
  await Promise.all(probes.map((probe) => once(probe.listen(0, '127.0.0.1'), 'listening')));
  const [web, http, https] = probes;
  const portOf = (probe: typeof web) => (probe.address() as AddressInfo).port;
  const ports: [number, number, number] = [portOf(web), portOf(http), portOf(https)];
  await Promise.all(probes.map((probe) => new Promise((closed) => probe.close(closed))));
  return ports;
}
