import { type ImportUploadRow } from '#db/queries/importUploads';
import { type Upload } from '#lib/contracts/importUploads';

/** An upload in parts as the interface gives it. */
export function uploadJson(row: ImportUploadRow): Upload {
  return {
    id: row.id,
    station: row.stationCode,
    fileName: row.fileName,
    bytes: row.fileBytes,
    offset: row.receivedBytes,
    mark: row.mark,
    createdAt: row.createdAt.toISOString(),
    createdBy: row.createdByName,
    import: row.importId,
  };
}
