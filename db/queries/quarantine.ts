import { createHash } from 'node:crypto';
import { type Connection } from './connection';

/** A refused record, kept for the operator with its reason. */
export interface NewQuarantined {
  code: string;
  detail: string;
  /** JSON of the record with its post's bands. */
  record: string;
  startSec: number | null;
}

const ROWS_A_STATEMENT = 100;

/** Keeps refused records. The same record refused again for the same reason is counted, not kept twice. */
export async function insertQuarantined(
  stationId: number,
  records: readonly NewQuarantined[],
  receivedAt: Date,
  conn: Connection,
): Promise<void> {
  for (let first = 0; first < records.length; first += ROWS_A_STATEMENT) {
    const part = records.slice(first, first + ROWS_A_STATEMENT);
    await conn.raw(
      `INSERT INTO quarantine (station_id, code, detail, record, record_digest, starts_at, received_at)
       VALUES ${part.map(() => '(?, ?, ?, ?, ?, ?, ?)').join(', ')}
       ON DUPLICATE KEY UPDATE times_received = times_received + 1`,
      part.flatMap(({ code, detail, record, startSec }) => [
        stationId,
        code,
        detail.slice(0, 500),
        record,
        createHash('sha256').update(record).digest(),
        startSec,
        receivedAt,
      ]),
    );
  }
}
