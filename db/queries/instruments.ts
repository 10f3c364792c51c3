import { pool, type Connection } from './connection';

/** A sound level meter with its microphone, as the network owns it. */
export interface InstrumentRow {
  id: number;
  networkId: number;
  serialNumber: string;
  /** 1 or 2 of IEC 61672-1. */
  class: 1 | 2;
  description: string;
  microphone: string;
  createdAt: Date;
  /** Set: out of use; it keeps its history. */
  retiredAt: Date | null;
}

const INSTRUMENT_COLUMNS = {
  id: 'id',
  networkId: 'network_id',
  serialNumber: 'serial_number',
  class: 'class',
  description: 'description',
  microphone: 'microphone',
  createdAt: 'created_at',
  retiredAt: 'retired_at',
} as const;

export type InstrumentDetails = Pick<InstrumentRow, 'serialNumber' | 'class' | 'description' | 'microphone'>;

/** Instruments of a network by serial number; retired ones too. */
export async function listInstruments(
  networkId: number,
  conn: Connection = pool(),
): Promise<InstrumentRow[]> {
  return conn('instruments')
    .where({ network_id: networkId })
    .orderBy('serial_number')
    .select(INSTRUMENT_COLUMNS);
}

export async function findInstrument(
  networkId: number,
  id: number,
  conn: Connection = pool(),
): Promise<InstrumentRow | undefined> {
  return conn('instruments').where({ network_id: networkId, id }).first(INSTRUMENT_COLUMNS);
}

/**
 * Locks an instrument until the transaction ends; whoever changes where it stands or how it was checked holds this lock. Where a
 * station is locked as well, the instrument comes first.
 */
export async function lockInstrument(id: number, transaction: Connection): Promise<void> {
  await transaction('instruments').where({ id }).forUpdate().first('id');
}

/** Adds an instrument and answers its id. A serial number that the network has already fails with MariaDB's duplicate-key error. */
export async function insertInstrument(
  networkId: number,
  details: InstrumentDetails,
  createdBy: string,
  conn: Connection,
): Promise<number> {
  const [id] = await conn('instruments').insert({
    network_id: networkId,
    ...columnsOf(details),
    created_by: createdBy,
    created_at: new Date(),
  });
  return Number(id);
}

export async function updateInstrument(
  id: number,
  changes: Partial<InstrumentDetails & Pick<InstrumentRow, 'retiredAt'>>,
  conn: Connection,
): Promise<void> {
  await conn('instruments').where({ id }).update(columnsOf(changes));
}

function columnsOf(values: Partial<InstrumentRow>): Record<string, unknown> {
  return Object.fromEntries(
    Object.entries(values).map(([key, value]) => [
      INSTRUMENT_COLUMNS[key as keyof typeof INSTRUMENT_COLUMNS],
      value,
    ]),
  );
}
