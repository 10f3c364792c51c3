import mysql, { type Connection } from 'mysql2/promise';
import { config } from '#lib/config/index';
import { SESSION_MODES } from '../settings';
import { tlsOf } from '../tls';

/** A server that keeps buckets. */
export interface DataServer {
  name: string;
  host: string;
  port: number;
}

/** The servers by the settings; none where the high-volume tables are local. */
export function dataServers(): DataServer[] {
  return config().database.dataServers;
}

/** What the head calls a server: its list of servers is one for all databases of the head. */
export function linkName({ name }: Pick<DataServer, 'name'>): string {
  return `${config().database.name}_${name}`;
}

/** A connection to a data server, in our database where that is there already. The caller ends it. */
export async function connectTo(
  { host, port }: DataServer,
  { isDatabaseThere = true } = {},
): Promise<Connection> {
  const { dataUser, dataPassword, dataTlsCaFile, name } = config().database;
  const connection = await mysql.createConnection({
    host,
    port,
    user: dataUser,
    password: dataPassword,
    database: isDatabaseThere ? name : undefined,
    charset: 'utf8mb4',
    timezone: 'Z',
    supportBigNumbers: true,
    connectTimeout: 5_000,
    multipleStatements: true,
    ...tlsOf({ host, tlsCaFile: dataTlsCaFile }),
  });
  await connection.query(SESSION_MODES);
  return connection;
}

/** Does something on each of some data servers, at the same time. */
export async function onEach<T>(
  servers: readonly DataServer[],
  work: (connection: Connection, server: DataServer) => Promise<T>,
): Promise<T[]> {
  return Promise.all(
    servers.map(async (server) => {
      const connection = await connectTo(server);
      try {
        return await work(connection, server);
      } finally {
        await connection.end();
      }
    }),
  );
}
