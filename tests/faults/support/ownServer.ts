import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import mysql from 'mysql2/promise';
import { freePorts } from '#ops/bench/support/soak/ports';
import { startDatabase, type DatabasePlace, type DatabaseServer } from '#ops/database/server';

const OWN_DATABASE = 'faults';

/** A MariaDB of one test file's own, which it may stop, fill and lock. */
export class OwnServer {
  private constructor(
    readonly place: DatabasePlace,
    private server: DatabaseServer,
  ) {}

  /** Starts it with an empty database, and an account that owns this database alone; our settings lead there. */
  static async start(): Promise<OwnServer> {
    const directory = mkdtempSync(join(tmpdir(), 'bittern-faults-db-'));
    const [port = 0] = await freePorts(1);
    const place = { directory, port, user: 'owner', password: 'test', bufferPoolMiB: 64 };
    const own = new OwnServer(place, await startDatabase(place));
    await own.asRoot(`CREATE DATABASE ${OWN_DATABASE} CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci`);
    await own.asRoot(`CREATE USER web@'127.0.0.1' IDENTIFIED BY 'test'`);
    await own.asRoot(`GRANT ALL PRIVILEGES ON ${OWN_DATABASE}.* TO web@'127.0.0.1'`);
    Object.assign(process.env, {
      BITTERN_DB_HOST: '127.0.0.1',
      BITTERN_DB_PORT: String(port),
      BITTERN_DB_USER: 'web',
      BITTERN_DB_PASSWORD: 'test',
      BITTERN_DB_NAME: OWN_DATABASE,
    });
    return own;
  }

  get dataDirectory(): string {
    return join(this.place.directory, 'data', OWN_DATABASE);
  }

  async asRoot(statement: string): Promise<Record<string, unknown>[]> {
    const connection = await mysql.createConnection({
      socketPath: join(this.place.directory, 'socket'),
      user: 'root',
      password: this.place.password,
    });
    try {
      const [rows] = await connection.query(statement);
      return rows as Record<string, unknown>[];
    } finally {
      await connection.end();
    }
  }

  /** Shuts it down in order and starts it again. */
  async restart(): Promise<void> {
    await this.server.stop();
    this.server = await startDatabase(this.place);
  }

  /** Stops it for good and removes its files, before which `release` lets go of them. */
  async stop(release: () => void = () => undefined): Promise<void> {
    await this.server.stop();
    release();
    rmSync(this.place.directory, { recursive: true, force: true });
  }
}
