import { pool, type Connection } from './connection';

/** What an operator says of a weather mast that stations share. */
export interface MastFacts {
  name: string;
  latitude: number;
  longitude: number;
  /** Of the anemometer above ground. */
  heightM: number;
  /** A record speaks of an interval that it does not overlap when it lies less than this away. */
  maximumAgeSec: number;
}

export interface MastRow extends MastFacts {
  id: number;
  networkId: number;
  code: string;
  retiredAt: Date | null;
}

const COLUMNS = {
  id: 'id',
  networkId: 'network_id',
  code: 'code',
  name: 'name',
  latitude: 'latitude',
  longitude: 'longitude',
  heightM: 'height_m',
  maximumAgeSec: 'maximum_age_sec',
  retiredAt: 'retired_at',
} as const;

/** Masts of a network by code; retired ones too. */
export async function listMasts(networkId: number, conn: Connection = pool()): Promise<MastRow[]> {
  return conn('masts').where({ network_id: networkId }).orderBy('code').select(COLUMNS);
}

export async function findMast(
  networkId: number,
  code: string,
  conn: Connection = pool(),
): Promise<MastRow | undefined> {
  return conn('masts').where({ network_id: networkId, code }).first(COLUMNS);
}

/** Adds a mast and answers its id; a code that the network has already fails. */
export async function insertMast(
  networkId: number,
  code: string,
  facts: MastFacts,
  conn: Connection,
): Promise<number> {
  const [id] = await conn('masts').insert({
    network_id: networkId,
    code,
    ...cellsOf(facts),
    created_at: new Date(),
  });
  return Number(id);
}

export async function updateMast(
  id: number,
  facts: MastFacts,
  retiredAt: Date | null,
  conn: Connection,
): Promise<void> {
  await conn('masts')
    .where({ id })
    .update({ ...cellsOf(facts), retired_at: retiredAt });
}

/** Locks a mast until the transaction ends: its records and assignments change one after the other. */
export async function lockMast(id: number, transaction: Connection): Promise<void> {
  await transaction('masts').where({ id }).forUpdate().first('id');
}

function cellsOf({ name, latitude, longitude, heightM, maximumAgeSec }: MastFacts) {
  return { name, latitude, longitude, height_m: heightM, maximum_age_sec: maximumAgeSec };
}
