import { execFileSync, spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import mysql, { type RowDataPacket } from 'mysql2/promise';
import { makeCertificate } from './certificate';
import { certificateOf, dataPort, type Layout } from './layout';
import { pidOf, startProcess } from './processes';

const START_WITHIN_MS = 120_000;
const isRoot = process.getuid?.() === 0;
/** The state transfer of a node runs as its own user, who must not be root. */
export const USER = isRoot ? 'mysql' : execFileSync('id', ['-un'], { encoding: 'utf8' }).trim();

export const databaseDirectory = ({ databases }: Layout, name: string) => join(databases, name);
const socketOf = (layout: Layout, name: string) => join(databaseDirectory(layout, name), 'socket');

/** What every server of the cluster is started with. */
export function commonOptions(layout: Layout, name: string, port: number): string[] {
  const directory = databaseDirectory(layout, name);
  const tls = certificateOf(layout);
  return [
    tls ? `--defaults-file=${tls.options}` : '--no-defaults',
    `--user=${USER}`,
    `--datadir=${join(directory, 'data')}`,
    `--socket=${socketOf(layout, name)}`,
    // Of its own: a server that starts deletes temporary tables that it finds, others' too.
    `--tmpdir=${temporaryDirectory(layout, name)}`,
    `--pid-file=${join(directory, 'pid')}`,
    `--port=${port}`,
    '--bind-address=127.0.0.1',
    '--skip-name-resolve',
    '--character-set-server=utf8mb4',
    '--collation-server=utf8mb4_uca1400_ai_ci',
    '--innodb-flush-log-at-trx-commit=1',
    '--innodb-buffer-pool-size=192M',
    '--innodb-log-file-size=96M',
    '--max-connections=400',
    '--max-allowed-packet=64M',
    // Who waits at a data server waits as long as at the head (`db/settings.ts`).
    '--innodb-lock-wait-timeout=10',
    '--lock-wait-timeout=15',
    // Buckets are many tables.
    '--table-open-cache=4000',
    '--open-files-limit=16000',
  ];
}

const CERTIFIED_DAYS = 3650;

/** Makes the certificate of a layout that has TLS, where it is not there, and the file by which servers find it: a state transfer reads no other options. */
export function ensureCertificate(layout: Layout): void {
  const wanted = certificateOf(layout);
  if (!wanted || existsSync(wanted.options)) return;
  const directory = dirname(wanted.key);
  mkdirSync(directory, { recursive: true, mode: 0o711 });
  const { certificate, key } = makeCertificate(directory, 'cluster', {
    names: 'DNS:localhost,IP:127.0.0.1',
    days: CERTIFIED_DAYS,
  });
  writeFileSync(
    wanted.options,
    `[mysqld]\nssl-ca=${certificate}\nssl-cert=${certificate}\nssl-key=${key}\n\n[sst]\nssl-mode=VERIFY_CA\n`,
  );
  giveAway(directory);
}

/** Where a server has its temporary tables; made where it is not there. */
function temporaryDirectory(layout: Layout, name: string): string {
  const path = join(databaseDirectory(layout, name), 'temporary');
  if (!existsSync(path)) {
    mkdirSync(path, { recursive: true, mode: 0o711 });
    giveAway(databaseDirectory(layout, name));
  }
  return path;
}

/** Makes a server's directory at its first start. @returns whether it did. */
export function installDatabase(layout: Layout, name: string): boolean {
  const directory = databaseDirectory(layout, name);
  if (existsSync(join(directory, 'data', 'mysql'))) return false;
  mkdirSync(directory, { recursive: true, mode: 0o711 });
  const made = spawnSync(
    'mariadb-install-db',
    [
      '--no-defaults',
      '--auth-root-authentication-method=normal',
      '--skip-test-db',
      `--datadir=${join(directory, 'data')}`,
      `--user=${USER}`,
    ],
    { encoding: 'utf8' },
  );
  if (made.status !== 0) throw new Error(`${name} could not be set up:\n${made.stdout}${made.stderr}`);
  giveAway(directory);
  return true;
}

/** Gives a directory to the databases' user. */
export function giveAway(directory: string): void {
  if (isRoot) execFileSync('chown', ['-R', `${USER}:`, directory]);
}

/** Starts those data servers that do not run, and waits for them. */
export async function startDataServers(layout: Layout, numbers: readonly number[]): Promise<void> {
  for (const number of numbers) {
    const name = `data${number}`;
    if (pidOf(layout, name) !== null) continue;
    installDatabase(layout, name);
    startProcess(layout, name, ['mariadbd', ...commonOptions(layout, name, dataPort(layout, number))]);
  }
  for (const number of numbers) {
    await untilAnswered(layout, `data${number}`, 'SELECT 1');
    await ensureOwner(layout, `data${number}`);
  }
}

/** Makes the account of Bittern, where there is none; root has no password and is reached by the socket alone. */
export async function ensureOwner(layout: Layout, name: string): Promise<void> {
  const root = await mysql.createConnection({ socketPath: socketOf(layout, name), user: 'root' });
  await root.query('CREATE USER IF NOT EXISTS bittern@127.0.0.1 IDENTIFIED BY ?', [layout.password]);
  await root.query(
    `GRANT ALL PRIVILEGES ON *.* TO bittern@127.0.0.1 REQUIRE ${layout.hasTls ? 'SSL' : 'NONE'}`,
  );
  await root.query('CREATE USER IF NOT EXISTS look@127.0.0.1');
  await root.end();
}

/** Waits until a server answers a question by the socket with a row. */
export async function untilAnswered(layout: Layout, name: string, question: string): Promise<void> {
  const deadline = Date.now() + START_WITHIN_MS;
  while (Date.now() < deadline) {
    if (pidOf(layout, name) === null) break;
    if ((await askRoot(layout, name, question).catch(() => [])).length > 0) return;
    await sleep(200);
  }
  throw new Error(`${name} did not start; see ${join(layout.directory, 'log', `${name}.log`)}`);
}

/** Rows of a question to a server by its socket. */
export async function askRoot(layout: Layout, name: string, question: string): Promise<RowDataPacket[]> {
  const root = await mysql.createConnection({
    socketPath: socketOf(layout, name),
    user: 'root',
    connectTimeout: 2_000,
  });
  try {
    const [rows] = await root.query<RowDataPacket[]>(question);
    return rows;
  } finally {
    root.destroy();
  }
}
