import { join, resolve } from 'node:path';
import mysql from 'mysql2/promise';
import type { Config } from '#lib/config/config';
import { tlsOf } from '#db/tls';
import { makeAppAccount } from '#ops/database/appAccount';
import { startDatabase, type DatabaseServer } from '#ops/database/server';

const RESTART_MS = 500;

/** Our own MariaDB, started again when it dies (InnoDB recovers what was committed), until it is told to stop. */
export class OwnDatabase {
  private server: DatabaseServer | undefined;
  private isStopping = false;

  constructor(private readonly config: Config) {}

  async start(): Promise<void> {
    const { dataDir, database } = this.config;
    const directory = join(dataDir, 'mariadb');
    const server = await startDatabase({ directory, ...database, bufferPoolMiB: 512 });
    this.server = server;
    server.process.once('exit', () => this.isStopping || this.startAgain());
  }

  /** Makes the account that web and worker use, which may add to the audit trail and not change it; the tables must be there. */
  async makeAppAccount(): Promise<{ user: string; password: string }> {
    const { dataDir, database } = this.config;
    const root = await mysql.createConnection({
      socketPath: join(resolve(dataDir, 'mariadb'), 'socket'),
      user: 'root',
      password: database.password,
    });
    try {
      return await makeAppAccount(root, { owner: database.user, database: database.name });
    } finally {
      await root.end();
    }
  }

  private startAgain(): void {
    console.log('database ended; starting it again.');
    setTimeout(() => {
      if (this.isStopping) return;
      this.start().catch((error: Error) => {
        console.error(`The database does not start: ${error.message}`);
        this.startAgain();
      });
    }, RESTART_MS);
  }

  async stop(): Promise<void> {
    this.isStopping = true;
    await this.server?.stop();
  }
}

/** Makes the database itself where it is missing; the tables come from the migrations. */
export async function ensureDatabase({ database }: Config): Promise<void> {
  const { host, port, user, password, name } = database;
  const connection = await mysql.createConnection({ host, port, user, password, ...tlsOf(database) });
  await connection.query(
    `CREATE DATABASE IF NOT EXISTS \`${name}\` CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`,
  );
  await connection.end();
}
