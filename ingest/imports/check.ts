import { inTransaction } from '#db/queries/connection';
import { insertStaged } from '#db/queries/importIntervals';
import { insertImportRefusals } from '#db/queries/importRefusals';
import { lockImport, updateImport, type ImportRow } from '#db/queries/imports';
import { findStationById } from '#db/queries/stations';
import { type ImportMapping, type RowReason } from '#lib/contracts/imports';
import { type RefusalCode } from '#lib/contracts/intervals';
import { noteAccepted, noteRefused, parseReport, type KeptReport } from '#lib/services/imports/report';
import { decide } from '../receive/decide';
import { keptRecord, type KeptRecord } from '../receive/keptRecord';
import { Refusal } from '../receive/parseRecord';
import { rowChunks, UnreadableFile, type RowChunk } from './csvRows';
import { clearStaged } from './discard';
import { importPath } from './files';
import { layoutOf, type Layout } from './layout';
import { occupiedBy } from './occupiedBy';
import { readChunk, type ReadChunk, type RefusedRow } from './readChunk';

const ROWS_A_CHUNK = 2000;
/** Refused records that an import brings to the quarantine at most: what a wrong file holds must not fill the disk twice. */
const MOST_KEPT = 10_000;

/**
 * Goes on with the dry run of an import from its last committed chunk until `isOver` says so or the file ends. Every row is read
 * and decided as a post's records are, against what is stored and what earlier rows would store; nothing is stored.
 * @returns how many rows it did.
 */
export async function checkImport(row: ImportRow, isOver: () => boolean): Promise<number> {
  // Another worker may have lost the lock of this job without knowing, and have put the first chunk aside meanwhile.
  const isAtBeginning = ({ state, bytesDone }: ImportRow) => state === 'checking' && bytesDone === 0;
  if (isAtBeginning(row)) await clearStaged(row.id, isAtBeginning);
  const layout = await layoutFor(row);
  const format = layout.mapping;
  let done = 0;
  let from = { bytesDone: row.bytesDone, linesDone: row.linesDone };
  for await (const chunk of rowChunks(importPath(row.fileKey), from, format, ROWS_A_CHUNK)) {
    if (!(await checkChunk(row, from.bytesDone, chunk, layout))) return done;
    done += chunk.rows.length;
    from = chunk;
    if (isOver()) return done;
  }
  await inTransaction(async (transaction) => {
    const now = await lockImport(row.id, transaction);
    if (now.state !== 'checking' || now.bytesDone !== from.bytesDone) return;
    await updateImport(row.id, { state: 'checked', bytesDone: row.fileBytes }, transaction);
  });
  return done + 1;
}

async function layoutFor(row: ImportRow): Promise<Layout> {
  const station = await findStationById(row.stationId);
  if (!station || row.mapping === null) throw new UnreadableFile('It is not said what the columns are.');
  const layout = await layoutOf(JSON.parse(row.mapping) as ImportMapping, station.bandFraction);
  if ('problems' in layout) {
    throw new UnreadableFile(layout.problems.map(({ field, message }) => `${field} ${message}.`).join(' '));
  }
  return layout;
}

/** Decides one chunk in one transaction with how far the file has been read. @returns false when somebody else did. */
function checkChunk(
  { id, stationId }: ImportRow,
  expectedBytes: number,
  chunk: RowChunk,
  layout: Layout,
): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const row = await lockImport(id, transaction);
    if (row.state !== 'checking' || row.bytesDone !== expectedBytes) return false;
    const station = await findStationById(stationId, transaction);
    const report = parseReport(row.report);
    const nowSec = Math.floor(Date.now() / 1000);
    const read = readChunk(chunk, layout, nowSec);
    const decision = decide(read.candidates, {
      stored: await occupiedBy(row, read.candidates, transaction),
      bandSet: layout.bandSet,
      acceptsFromSec: station?.acceptsFromSec ?? null,
      receivedAtSec: nowSec,
    });
    const refused = [
      ...read.refused,
      ...decision.refused.map(({ index, refusal }) => ({
        index,
        reason: refusal.code,
        detail: refusal.detail,
      })),
    ].sort((a, b) => a.index - b.index);
    report.rows += chunk.rows.length;
    report.known += decision.knownCount;
    noteAccepted(
      report,
      decision.accepted.map(({ startSec }) => startSec),
    );
    const kept = noteAllRefused(refused, { chunk, read, layout }, report);
    await insertStaged(id, decision.accepted, transaction);
    await insertImportRefusals(id, kept, transaction);
    const { bytesDone, linesDone } = chunk;
    await updateImport(id, { bytesDone, linesDone, report: JSON.stringify(report) }, transaction);
    return true;
  });
}

function noteAllRefused(
  refused: readonly RefusedRow[],
  { chunk, read, layout }: { chunk: RowChunk; read: ReadChunk; layout: Layout },
  report: KeptReport,
): KeptRecord[] {
  const bandsHz = layout.bands.map(({ nominalHz }) => nominalHz);
  const kept: KeptRecord[] = [];
  for (const { index, reason, detail } of refused) {
    noteRefused(report, reason, chunk.rows[index]?.line ?? 0, detail);
    if (report.kept === MOST_KEPT) continue;
    const record = keptRecord(
      { index, refusal: new Refusal(codeOf(reason), detail) },
      read.records[index],
      bandsHz,
    );
    if (!record) continue;
    kept.push(record);
    report.kept += 1;
  }
  return kept;
}

/** The code under which the quarantine keeps a row. */
function codeOf(reason: RowReason): RefusalCode {
  return reason === 'ambiguous-time' || reason === 'nonexistent-time' ? 'malformed' : reason;
}
