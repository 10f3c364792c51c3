import { spawn, spawnSync, type ChildProcess } from 'node:child_process';
import { existsSync, mkdirSync, openSync } from 'node:fs';
import { createServer } from 'node:net';
import { join, resolve } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import mysql from 'mysql2/promise';

/** Where a MariaDB of our own lives and how it is reached. */
export interface DatabasePlace {
  directory: string;
  port: number;
  user: string;
  password: string;
  bufferPoolMiB: number;
  /** Further options of the server, such as for a binary log. */
  options?: readonly string[];
}

export interface DatabaseServer {
  process: ChildProcess;
  /** Asks it to shut down and waits until it has. */
  stop(): Promise<void>;
}

const START_TIMEOUT_MS = 60_000;

/**
 * Starts our own MariaDB on loopback in `directory` (made at the first start, with `user` as its owner of all data).
 * Every commit is flushed to disk before it is acknowledged. A server elsewhere on the machine is left alone.
 * @throws when the port is taken, or the server does not come up; the message names its log.
 */
export async function startDatabase(place: DatabasePlace): Promise<DatabaseServer> {
  await requireFreePort(place.port);
  const directory = resolve(place.directory);
  const dataDirectory = join(directory, 'data');
  const isNew = !existsSync(join(dataDirectory, 'mysql'));
  if (isNew) installSystemTables(directory, dataDirectory);
  const server = spawnServer(directory, dataDirectory, place);
  await untilReady(server, join(directory, 'socket'), join(directory, 'error.log'));
  if (isNew) await createOwner(join(directory, 'socket'), place);
  return { process: server, stop: () => stop(server) };
}

function installSystemTables(directory: string, dataDirectory: string): void {
  mkdirSync(directory, { recursive: true, mode: 0o700 });
  const made = spawnSync(
    'mariadb-install-db',
    [
      '--no-defaults',
      '--auth-root-authentication-method=normal',
      '--skip-test-db',
      `--datadir=${dataDirectory}`,
      `--user=${currentUser()}`,
    ],
    { encoding: 'utf8' },
  );
  if (made.status !== 0)
    throw new Error(`MariaDB could not be set up in ${dataDirectory}:\n${made.stdout}${made.stderr}`);
}

function spawnServer(
  directory: string,
  dataDirectory: string,
  { port, bufferPoolMiB, options = [] }: DatabasePlace,
): ChildProcess {
  const log = openSync(join(directory, 'error.log'), 'a');
  return spawn(
    'mariadbd',
    [
      '--no-defaults',
      `--user=${currentUser()}`,
      `--datadir=${dataDirectory}`,
      `--socket=${join(directory, 'socket')}`,
      `--pid-file=${join(directory, 'pid')}`,
      `--port=${port}`,
      '--bind-address=127.0.0.1',
      '--skip-name-resolve',
      '--character-set-server=utf8mb4',
      '--collation-server=utf8mb4_uca1400_ai_ci',
      '--innodb-flush-log-at-trx-commit=1',
      '--innodb-doublewrite=1',
      `--innodb-buffer-pool-size=${bufferPoolMiB}M`,
      '--innodb-log-file-size=256M',
      '--max-connections=200',
      '--max-allowed-packet=64M',
      // Slower statements, for whoever operates it; they may hold what people typed, so the file is its owner's alone.
      '--slow-query-log=1',
      `--slow-query-log-file=${join(directory, 'slow.log')}`,
      '--long-query-time=2',
      '--log-slow-verbosity=query_plan',
      ...options,
    ],
    { stdio: ['ignore', log, log], detached: true },
  );
}

function currentUser(): string {
  return spawnSync('id', ['-un'], { encoding: 'utf8' }).stdout.trim();
}

async function untilReady(server: ChildProcess, socketPath: string, logPath: string): Promise<void> {
  const deadline = Date.now() + START_TIMEOUT_MS;
  while (server.exitCode === null && Date.now() < deadline) {
    const isUp = await mysql
      .createConnection({ socketPath, user: 'root' })
      .then((connection) => connection.end().then(() => true))
      // Once the owner is made, root has a password: being refused means that it answers.
      .catch((error: { code?: string }) => error.code === 'ER_ACCESS_DENIED_ERROR');
    if (isUp) return;
    await sleep(150);
  }
  throw new Error(`MariaDB did not start; see ${logPath}`);
}

async function createOwner(socketPath: string, { user, password }: DatabasePlace): Promise<void> {
  const connection = await mysql.createConnection({ socketPath, user: 'root' });
  await connection.query('CREATE USER ?@? IDENTIFIED BY ?', [user, '127.0.0.1', password]);
  await connection.query('GRANT ALL PRIVILEGES ON *.* TO ?@?', [user, '127.0.0.1']);
  await connection.query('SET PASSWORD FOR root@localhost = PASSWORD(?)', [password]);
  await connection.end();
}

async function stop(server: ChildProcess): Promise<void> {
  if (server.exitCode !== null || server.signalCode !== null) return;
  const ended = new Promise((done) => server.once('exit', done));
  server.kill('SIGTERM');
  await ended;
}

/** @throws when something listens on the port already. */
export async function requireFreePort(port: number): Promise<void> {
  await new Promise<void>((free, taken) => {
    const probe = createServer();
    probe.once('error', () => taken(new Error(`Port ${port} on 127.0.0.1 is taken.`)));
    probe.listen(port, '127.0.0.1', () => probe.close(() => free()));
  });
}
