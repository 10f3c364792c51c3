import { pool, type Connection } from './connection';

/** A named date of a network, in its zone, that limits may treat as a Sunday or leave out. */
export interface Holiday {
  /** `YYYY-MM-DD`. */
  date: string;
  name: string;
}

/** Named dates of a network in order of time. */
export async function listHolidays(networkId: number, conn: Connection = pool()): Promise<Holiday[]> {
  return conn('network_holidays').where({ network_id: networkId }).orderBy('date').select('date', 'name');
}

/** Puts a list in the place of the one that a network had. */
export async function replaceHolidays(
  networkId: number,
  holidays: readonly Holiday[],
  createdBy: string,
  transaction: Connection,
): Promise<void> {
  await transaction('network_holidays').where({ network_id: networkId }).delete();
  if (holidays.length === 0) return;
  const common = { network_id: networkId, created_by: createdBy, created_at: new Date() };
  await transaction('network_holidays').insert(holidays.map(({ date, name }) => ({ ...common, date, name })));
}
