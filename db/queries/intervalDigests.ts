import { createHash } from 'node:crypto';
import { bandSetById } from './bandSets';
import { pool, type Connection } from './connection';
import { INTERVAL_COLUMNS, type IntervalCells } from './intervalRows';
import { LONGEST_INTERVAL_SEC } from './intervals';

/** Digest of a station’s intervals of a span. */
export interface IntervalDigest {
  intervals: number;
  /** SHA-256, hexadecimal. */
  sha256: string;
  /** Latest reception among them, epoch seconds; null without intervals. */
  receivedSec: number | null;
}

/** Read in parts of this length, so that a month never stands in memory. */
const PART_SEC = 7 * 86_400;
const HEAD_BYTES = 18;
const TAIL_BYTES = 10;
const NO_LEVEL = -32_768;
const NO_VALUE = 65_535;

/**
 * Digest of every interval of a station that overlaps `fromSec <= t < toSec`, in order of time. Each is packed, little endian, as: start
 * (uint32, epoch seconds), seconds (uint16), LAeq, LAFmax, LAFmin, LCeq, LCpeak (int16, hundredths of a dB), fraction (uint8), number of
 * bands (uint8), band indices (int8 each), band levels (int16 each), flags (uint16), wind speed in cm/s and direction in degrees (uint16),
 * temperature in hundredths of a degree (int16), battery in hundredths of a volt (uint16). None is −32768, or 65535 where unsigned.
 */
export async function digestIntervals(
  stationId: number,
  fromSec: number,
  toSec: number,
  conn: Connection = pool(),
): Promise<IntervalDigest> {
  const hash = createHash('sha256');
  let intervals = 0;
  let receivedSec: number | null = null;
  let afterSec = fromSec - LONGEST_INTERVAL_SEC;
  while (afterSec < toSec) {
    const partEndSec = Math.min(afterSec + PART_SEC, toSec);
    const [rows] = (await conn
      .raw(
        `SELECT ${INTERVAL_COLUMNS} FROM interval_levels WHERE station_id = ? AND starts_at > ? AND starts_at <= ?
           AND starts_at < ? AND starts_at + duration_sec > ? ORDER BY starts_at`,
        [stationId, afterSec, partEndSec, toSec, fromSec],
      )
      .options({ rowsAsArray: true })) as unknown as [IntervalCells[]];
    for (const row of rows) {
      hash.update(await packed(row, conn));
      receivedSec = Math.max(receivedSec ?? 0, row[12]);
    }
    intervals += rows.length;
    afterSec = partEndSec;
  }
  return { intervals, sha256: hash.digest('hex'), receivedSec };
}

async function packed(row: IntervalCells, conn: Connection): Promise<Buffer> {
  const { fraction, indices } = await bandSetById(row[7], conn);
  const levels = row[8];
  const record = Buffer.alloc(HEAD_BYTES + indices.length + levels.length + TAIL_BYTES);
  record.writeUInt32LE(row[0], 0);
  record.writeUInt16LE(row[1], 4);
  for (const [at, level] of [row[2], row[3], row[4], row[5], row[6]].entries()) {
    record.writeInt16LE(level ?? NO_LEVEL, 6 + 2 * at);
  }
  record.writeUInt8(fraction, 16);
  record.writeUInt8(indices.length, 17);
  for (const [at, index] of indices.entries()) record.writeInt8(index, HEAD_BYTES + at);
  levels.copy(record, HEAD_BYTES + indices.length);
  const tailAt = HEAD_BYTES + indices.length + levels.length;
  record.writeUInt16LE(row[9], tailAt);
  record.writeUInt16LE(row[10] ?? NO_VALUE, tailAt + 2);
  record.writeUInt16LE(row[11] ?? NO_VALUE, tailAt + 4);
  record.writeInt16LE(row[13] ?? NO_LEVEL, tailAt + 6);
  record.writeUInt16LE(row[14] ?? NO_VALUE, tailAt + 8);
  return record;
}
