import { type RefusedWeather, type RefusedWeatherRow } from '#db/queries/weatherQuarantine';
import { formatInstantUtc, parseInstant } from '#lib/contracts/common';
import { type RefusalCode } from '#lib/contracts/intervals';
import { type RefusedWeatherRecord } from '#lib/contracts/weatherQuarantine';

/** Many times a real record's length. */
const MOST_CHARS = 4096;
const LATEST_SEC = 4_294_967_295;

/** What to keep of a refused record; null when it is too long, or nested too deeply, to be one. */
export function keptWeather(
  { code, detail }: { code: RefusalCode; detail: string },
  value: unknown,
): RefusedWeather | null {
  const record = jsonOf(value);
  if (record === null || record.length > MOST_CHARS) return null;
  const start: unknown = (value as { start?: unknown } | null)?.start;
  const sec = typeof start === 'string' ? parseInstant(start) : null;
  const startSec = sec === null || sec < 0 || sec > LATEST_SEC ? null : Math.floor(sec);
  return { code, detail, record, startSec };
}

function jsonOf(value: unknown): string | null {
  try {
    return JSON.stringify(value);
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** A kept record as the interface tells it. */
export function refusedWeatherJson(row: RefusedWeatherRow): RefusedWeatherRecord {
  return {
    id: Number(row.id),
    code: row.code as RefusedWeatherRecord['code'],
    detail: row.detail,
    start: row.startSec === null ? null : formatInstantUtc(row.startSec),
    receivedAt: row.receivedAt.toISOString(),
    timesReceived: row.timesReceived,
    state: row.settlement ?? 'open',
    settled: row.settledAt && {
      at: row.settledAt.toISOString(),
      by: row.settledByName,
      reason: row.settlementReason,
    },
    record: JSON.parse(row.record) as unknown,
  };
}
