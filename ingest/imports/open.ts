import type { Knex } from 'knex';
import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { findImport, insertImport, lockImport } from '#db/queries/imports';
import { findStationById, type StationRow } from '#db/queries/stations';
import { type BandFraction } from '#lib/acoustics/bands';
import { type Import, type ImportMapping } from '#lib/contracts/imports';
import { importJson } from '#lib/services/imports/importJson';
import { EMPTY_REPORT } from '#lib/services/imports/report';
import { UnusableFile } from '#lib/services/imports/unusable';
import { keepFile, readHead, removeFile } from './files';
import { layoutOf } from './layout';
import { sniff, type Head, type Shape } from './sniff';

const HEAD_BYTES = 64 * 1024;

export interface Upload {
  networkId: number;
  station: StationRow;
  userId: string;
  fileName: string;
  /** Zone of the network, for times without an offset. */
  zone: string;
  /** SHA-256 that the unpacked file must have; left out or null: any. */
  digest?: Buffer | null;
  /** Done in the transaction that adds the import. */
  alsoDo?: (importId: number, transaction: Knex.Transaction) => Promise<void>;
}

/**
 * Keeps a file for a station as a new import. The contract's own format is checked at once; any other waits until somebody has
 * said what its columns are.
 * @throws {UnusableFile}
 */
export async function openImport(upload: Upload, source: AsyncIterable<Uint8Array>): Promise<Import> {
  const file = await keepFile(source);
  try {
    const { station, networkId, userId, digest, alsoDo } = upload;
    if (digest && !digest.equals(file.digest)) throw differs();
    const fileName = shownName(upload.fileName);
    const mapping = await ownMappingOf(file.key, upload);
    return await inTransaction(async (transaction) => {
      const id = await insertImport(
        {
          networkId,
          stationId: station.id,
          state: mapping ? 'checking' : 'mapping',
          fileKey: file.key,
          fileName,
          fileBytes: file.bytes,
          fileDigest: file.digest,
          mapping: mapping && JSON.stringify(mapping),
          report: EMPTY_REPORT,
          createdBy: userId,
        },
        transaction,
      );
      await appendAudit(
        {
          userId,
          networkId,
          action: 'import.upload',
          subject: `station ${station.code}`,
          detail: { import: id, file: fileName, bytes: file.bytes, sha256: file.digest.toString('hex') },
        },
        transaction,
      );
      await alsoDo?.(id, transaction);
      return importJson(await lockImport(id, transaction));
    });
  } catch (error) {
    await removeFile(file.key);
    throw error;
  }
}

function differs(): UnusableFile {
  return new UnusableFile(
    'unreadable',
    'The file that arrived has another SHA-256 than was announced. Nothing of it was kept; send it anew.',
  );
}

/** The mapping of a file in the contract's own format that fits the station; null for any other file. */
async function ownMappingOf(key: string, { station, zone }: Upload): Promise<ImportMapping | null> {
  const head = sniff(await readHead(key, HEAD_BYTES), { zone, intervalSec: station.intervalSec });
  if (!head.isOwn) return null;
  const layout = await layoutOf(head.guess, station.bandFraction);
  return 'problems' in layout ? null : head.guess;
}

/** What the beginning of an import's file shows, for saying what its columns are; null when there is no such import, or its file is gone. */
export async function importHead(
  { networkId, id, zone }: { networkId: number; id: number; zone: string },
  shape: Partial<Shape>,
): Promise<(Head & { bandFraction: BandFraction }) | null> {
  const row = await findImport(networkId, id);
  const station = row && (await findStationById(row.stationId));
  if (!row || !station) return null;
  const { intervalSec, bandFraction } = station;
  const bytes = await readHead(row.fileKey, HEAD_BYTES).catch((error: { code?: string }) => {
    if (error.code === 'ENOENT') return null;
    throw error;
  });
  return bytes && { ...sniff(bytes, { zone, intervalSec, shape }), bandFraction };
}

/** A file's name as it is shown: without a path, not too long. */
export function shownName(given: string): string {
  const name = given
    .replace(/^.*[\\/]/, '')
    .replace(/\p{Cc}/gu, '')
    .trim();
  return name === '' ? 'intervals.csv' : name.slice(0, 160);
}
