import type { Connection, RowDataPacket } from 'mysql2/promise';
import { connectTo, dataServers } from '#db/sharding/dataServers';
import { config } from '#lib/config/index';

/** A killed mover's connection is noticed within this. */
const WAIT_SEC = 5;
const LONGEST_MOVE_SEC = 7 * 86_400;

/**
 * Has one bucket move at a time: each switch writes the links of all buckets anew. The turn is a lock by name on the first data server, which is
 * a single one, and ends with the connection, which the caller ends. @throws where another move goes on.
 */
export async function takeTurn(): Promise<Connection> {
  const [first] = dataServers();
  if (!first) throw new Error('There are no data servers.');
  const connection = await connectTo(first, { isDatabaseThere: false });
  await connection.query(`SET SESSION wait_timeout = ${LONGEST_MOVE_SEC}`);
  const [[row]] = await connection.query<RowDataPacket[]>('SELECT GET_LOCK(?, ?) AS is_ours', [
    `${config().database.name}.move`,
    WAIT_SEC,
  ]);
  if (row?.['is_ours'] === 1) return connection;
  await connection.end();
  throw new Error('Another bucket is being moved: one at a time.');
}
