import { type ListedQuarantined, type QuarantineRow } from '#db/queries/quarantine';
import { formatInstantUtc } from '#lib/contracts/common';
import { type Quarantined, type QuarantineCode, type QuarantinedRecord } from '#lib/contracts/quarantine';

/** A record in quarantine as the interface lists it. */
export function quarantineJson(row: ListedQuarantined): Quarantined {
  return {
    id: Number(row.id),
    station: row.stationCode,
    code: row.code as QuarantineCode,
    detail: row.detail,
    start: row.startSec === null ? null : formatInstantUtc(row.startSec),
    receivedAt: row.receivedAt.toISOString(),
    timesReceived: row.timesReceived,
    importId: row.importId,
    state: row.settlement ?? 'open',
    settled: row.settledAt && {
      at: row.settledAt.toISOString(),
      by: row.settledByName,
      reason: row.settlementReason,
    },
  };
}

/** The same with the record as it was received. */
export function quarantineRecordJson(row: QuarantineRow): QuarantinedRecord {
  return { ...quarantineJson(row), record: JSON.parse(row.record) as QuarantinedRecord['record'] };
}
