import type { FigureChange, StationFigures } from '#lib/contracts/summaryLife';
import { pool, type Connection } from './connection';
import { jsonOf } from './json';
import type { RevisionKey } from './summaryDrafts';

/** An issued revision of a month. Nothing of it is ever changed: the database refuses it. */
export interface IssuedSummaryRow extends RevisionKey {
  id: number;
  issuedBy: string;
  issuedByName: string;
  issuedAt: Date;
  note: string;
  figures: StationFigures[];
  /** Against the revision before; null: the first. */
  changes: FigureChange[] | null;
  keyId: number;
  /** The very text that is signed. */
  manifest: string;
  manifestSha256: Buffer;
  signature: Buffer;
}

export interface IssuedFileRow {
  summaryId: number;
  format: string;
  name: string;
  mediaType: string;
  byteCount: number;
  sha256: Buffer;
}

const COLUMNS = {
  id: 'id',
  networkId: 'network_id',
  month: 'month',
  revision: 'revision',
  issuedBy: 'issued_by',
  issuedByName: 'issued_by_name',
  issuedAt: 'issued_at',
  note: 'note',
  figures: 'figures',
  changes: 'changes',
  keyId: 'key_id',
  manifest: 'manifest',
  manifestSha256: 'manifest_sha256',
  signature: 'signature',
} as const;

const FILE_COLUMNS = {
  summaryId: 'summary_id',
  format: 'format',
  name: 'name',
  mediaType: 'media_type',
  byteCount: 'byte_count',
  sha256: 'sha256',
} as const;

const rowOf = (row: IssuedSummaryRow): IssuedSummaryRow => ({
  ...row,
  figures: jsonOf<StationFigures[]>(row.figures),
  changes: jsonOf<FigureChange[] | null>(row.changes),
});

/** Issued revisions of a network, of one month where it is given; latest month and revision first. */
export async function listIssued(
  networkId: number,
  month: string | null = null,
  conn: Connection = pool(),
): Promise<IssuedSummaryRow[]> {
  const rows: IssuedSummaryRow[] = await conn('issued_summaries')
    .where({ network_id: networkId, ...(month === null ? {} : { month }) })
    .orderBy([
      { column: 'month', order: 'desc' },
      { column: 'revision', order: 'desc' },
    ])
    .select(COLUMNS);
  return rows.map(rowOf);
}

/** Files of issued revisions, in the order of their formats. */
export async function listIssuedFiles(
  summaryIds: readonly number[],
  conn: Connection = pool(),
): Promise<IssuedFileRow[]> {
  if (summaryIds.length === 0) return [];
  return conn('issued_summary_files')
    .whereIn('summary_id', summaryIds)
    .orderBy(['summary_id', 'format'])
    .select(FILE_COLUMNS);
}

/** Issued revisions that a digest belongs to: of one of their files, or of the manifest itself. */
export async function findIssuedByDigest(
  sha256: Buffer,
  conn: Connection = pool(),
): Promise<{ summary: IssuedSummaryRow; file: IssuedFileRow | null }[]> {
  const files: IssuedFileRow[] = await conn('issued_summary_files').where({ sha256 }).select(FILE_COLUMNS);
  const rows: IssuedSummaryRow[] = await conn('issued_summaries')
    .whereIn(
      'id',
      files.map(({ summaryId }) => summaryId),
    )
    .orWhere({ manifest_sha256: sha256 })
    .orderBy('id')
    .select(COLUMNS);
  return rows.map((row) => ({
    summary: rowOf(row),
    file: files.find(({ summaryId }) => summaryId === row.id) ?? null,
  }));
}

/** Adds an issued revision with its files. A revision that is there already fails with MariaDB’s duplicate-key error. */
export async function insertIssued(
  issued: Omit<IssuedSummaryRow, 'id'>,
  files: readonly Omit<IssuedFileRow, 'summaryId'>[],
  transaction: Connection,
): Promise<void> {
  const [id] = await transaction('issued_summaries').insert({
    network_id: issued.networkId,
    month: issued.month,
    revision: issued.revision,
    issued_by: issued.issuedBy,
    issued_by_name: issued.issuedByName,
    issued_at: issued.issuedAt,
    note: issued.note,
    figures: JSON.stringify(issued.figures),
    changes: issued.changes === null ? null : JSON.stringify(issued.changes),
    key_id: issued.keyId,
    manifest: issued.manifest,
    manifest_sha256: issued.manifestSha256,
    signature: issued.signature,
  });
  await transaction('issued_summary_files').insert(
    files.map((file) => ({
      summary_id: Number(id),
      format: file.format,
      name: file.name,
      media_type: file.mediaType,
      byte_count: file.byteCount,
      sha256: file.sha256,
    })),
  );
}

/** What a list shows of an issued revision. */
export type IssuedHead = Pick<IssuedSummaryRow, 'month' | 'revision' | 'issuedAt' | 'issuedByName'>;

/** Issued revisions of a network without their manifests; latest month and revision first. */
export async function listIssuedHeads(networkId: number, conn: Connection = pool()): Promise<IssuedHead[]> {
  return conn('issued_summaries')
    .where({ network_id: networkId })
    .orderBy([
      { column: 'month', order: 'desc' },
      { column: 'revision', order: 'desc' },
    ])
    .select({
      month: 'month',
      revision: 'revision',
      issuedAt: 'issued_at',
      issuedByName: 'issued_by_name',
    });
}

/** Levels of issued revisions of a network; latest month and revision first. */
export async function listIssuedFigures(
  networkId: number,
  conn: Connection = pool(),
): Promise<Pick<IssuedSummaryRow, 'month' | 'revision' | 'figures'>[]> {
  const rows: Pick<IssuedSummaryRow, 'month' | 'revision' | 'figures'>[] = await conn('issued_summaries')
    .where({ network_id: networkId })
    .orderBy([
      { column: 'month', order: 'desc' },
      { column: 'revision', order: 'desc' },
    ])
    .select('month', 'revision', 'figures');
  return rows.map((row) => ({ ...row, figures: jsonOf<StationFigures[]>(row.figures) }));
}
