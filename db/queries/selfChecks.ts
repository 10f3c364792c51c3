import { pool, type Connection } from './connection';

/** What a monitor measured of its own source, and what it should have. Hundredths of a dB, epoch seconds. */
export interface SelfCheck {
  checkedAtSec: number;
  levelCentiDb: number;
  nominalCentiDb: number;
}

/** Self-checks of a station in `fromSec <= t < toSec`, ascending. */
export async function selectSelfChecks(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<SelfCheck[]> {
  return conn('self_checks')
    .where({ station_id: stationId })
    .where('checked_at', '>=', fromSec)
    .where('checked_at', '<', toSec)
    .orderBy('checked_at')
    .select({
      checkedAtSec: 'checked_at',
      levelCentiDb: 'level_centi_db',
      nominalCentiDb: 'nominal_centi_db',
    });
}

/** The self-check of a station at an instant. */
export async function findSelfCheck(
  stationId: number,
  checkedAtSec: number,
  conn: Connection,
): Promise<SelfCheck | undefined> {
  const [found] = await selectSelfChecks(stationId, checkedAtSec, checkedAtSec + 1, conn);
  return found;
}

export async function insertSelfCheck(
  stationId: number,
  { checkedAtSec, levelCentiDb, nominalCentiDb }: SelfCheck,
  receivedAtSec: number,
  conn: Connection,
): Promise<void> {
  await conn('self_checks').insert({
    station_id: stationId,
    checked_at: checkedAtSec,
    level_centi_db: levelCentiDb,
    nominal_centi_db: nominalCentiDb,
    received_at: receivedAtSec,
  });
}
