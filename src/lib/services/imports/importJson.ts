import { type ImportRow } from '#db/queries/imports';
import { type Import, type ImportMapping } from '#lib/contracts/imports';
import { parseReport, reportJson } from './report';

/** An import as the interface gives it. */
export function importJson(row: ImportRow): Import {
  return {
    id: row.id,
    station: row.stationCode,
    state: row.state,
    problem: row.problem,
    fileName: row.fileName,
    bytes: row.fileBytes,
    bytesDone: row.bytesDone,
    mapping: row.mapping === null ? null : (JSON.parse(row.mapping) as ImportMapping),
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdByName,
    report: reportJson(parseReport(row.report)),
    stored: row.storedCount,
    knownMeanwhile: row.lateKnownCount,
    refusedMeanwhile: row.lateRefusedCount,
    lastAct: row.actedAt && { at: row.actedAt.toISOString(), by: row.actedByName, reason: row.actReason },
    finishedAt: row.finishedAt && row.finishedAt.toISOString(),
  };
}
