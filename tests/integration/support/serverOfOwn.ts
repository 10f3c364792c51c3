import { once } from 'node:events';
import { createServer, type AddressInfo } from 'node:net';
import mysql from 'mysql2/promise';
import { join } from 'node:path';
import { startDatabase, type DatabaseServer } from '#ops/database/server';

export interface ServerOfOwn {
  server: DatabaseServer;
  /** Carries out a statement as the server's root. */
  asRoot(statement: string): Promise<void>;
}

/** A MariaDB with options of a test's own; our settings lead to an empty database on it. */
export async function startServerOfOwn(directory: string, options: string[]): Promise<ServerOfOwn> {
  const probe = createServer();
  await once(probe.listen(0, '127.0.0.1'), 'listening');
  const { port } = probe.address() as AddressInfo;
  await new Promise((closed) => probe.close(closed));
  const place = { directory, port, user: 'bittern', password: 'test', bufferPoolMiB: 64, options };
  const server = await startDatabase(place);
  const asRoot = async (statement: string) => {
    const socketPath = join(directory, 'socket');
    const connection = await mysql.createConnection({ socketPath, user: 'root', password: place.password });
    await connection.query(statement).finally(() => connection.end());
  };
  await asRoot('CREATE DATABASE own CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_ai_ci');
  Object.assign(process.env, {
    BITTERN_DB_HOST: '127.0.0.1',
    BITTERN_DB_PORT: String(port),
    BITTERN_DB_USER: place.user,
    BITTERN_DB_PASSWORD: place.password,
    BITTERN_DB_NAME: 'own',
  });
  return { server, asRoot };
}
