import { pool, type Connection } from './connection';

/** The network that an exceedance is of; undefined where there is none of this number. */
export async function findNetworkOfExceedance(
  id: number,
  conn: Connection = pool(),
): Promise<number | undefined> {
  const row: { networkId: number } | undefined = await conn('exceedances')
    .where({ id })
    .first({ networkId: 'network_id' });
  return row?.networkId;
}
