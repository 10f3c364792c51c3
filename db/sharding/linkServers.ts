import type { Knex } from 'knex';
import { config } from '#lib/config/index';
import { linkName, type DataServer } from './dataServers';

interface Known {
  Server_name: string;
  Host: string;
  Port: number;
  Db: string;
  Username: string;
  Password: string;
}

/** Tells the head of the data servers, anew where one has moved or has another password. Nodes of the head tell each other. */
export async function linkServers(conn: Knex, servers: readonly DataServer[]): Promise<void> {
  const { dataUser, dataPassword, name: database } = config().database;
  const [rows] = (await conn.raw('SELECT * FROM mysql.servers')) as [Known[]];
  for (const server of servers) {
    const link = linkName(server);
    const known = rows.find((row) => row.Server_name === link);
    const isCurrent =
      known?.Host === server.host &&
      known.Port === server.port &&
      known.Db === database &&
      known.Username === dataUser &&
      known.Password === dataPassword;
    if (isCurrent) continue;
    const options = `OPTIONS (HOST ?, PORT ${server.port}, USER ?, PASSWORD ?, DATABASE ?)`;
    const values = [server.host, dataUser, dataPassword, database];
    if (known) await conn.raw(`ALTER SERVER \`${link}\` ${options}`, values);
    else await conn.raw(`CREATE SERVER \`${link}\` FOREIGN DATA WRAPPER mysql ${options}`, values);
  }
}
