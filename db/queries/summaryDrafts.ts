import type { DraftState, StationFigures } from '#lib/contracts/summaryLife';
import { pool, type Connection } from './connection';
import { jsonOf } from './json';

/** Which revision of which month. */
export interface RevisionKey {
  networkId: number;
  month: string;
  revision: number;
}

/** A revision of a month on its way to being issued. */
export interface SummaryDraftRow extends RevisionKey {
  state: DraftState;
  draftedAt: Date;
  computedAt: Date | null;
  documentSha256: Buffer | null;
  dataSha256: Buffer | null;
  figures: StationFigures[] | null;
  progress: number;
  failure: string | null;
  submittedAt: Date | null;
  requestedBy: string | null;
  note: string;
  proposalId: number | null;
  fingerprint: Buffer | null;
}

const COLUMNS = {
  networkId: 'network_id',
  month: 'month',
  revision: 'revision',
  state: 'state',
  draftedAt: 'drafted_at',
  computedAt: 'computed_at',
  documentSha256: 'document_sha256',
  dataSha256: 'data_sha256',
  figures: 'figures',
  progress: 'progress',
  failure: 'failure',
  submittedAt: 'submitted_at',
  requestedBy: 'requested_by',
  note: 'note',
  proposalId: 'proposal_id',
  fingerprint: 'fingerprint',
} as const;

const rowOf = (row: SummaryDraftRow): SummaryDraftRow => ({
  ...row,
  figures: jsonOf<StationFigures[] | null>(row.figures),
});

const keyOf = ({ networkId, month, revision }: RevisionKey) => ({ network_id: networkId, month, revision });

/** Adds a draft whose figures wait to be made; false when it is there already. */
export async function insertDraft(
  key: RevisionKey,
  proposalId: number | null,
  conn: Connection = pool(),
): Promise<boolean> {
  try {
    await conn('summary_drafts').insert({
      ...keyOf(key),
      drafted_at: new Date(),
      proposal_id: proposalId,
    });
    return true;
  } catch (error) {
    if ((error as { code?: string }).code === 'ER_DUP_ENTRY') return false;
    throw error;
  }
}

/** Every revision of a network’s months, latest month and revision first. */
export async function listDrafts(networkId: number, conn: Connection = pool()): Promise<SummaryDraftRow[]> {
  const rows: SummaryDraftRow[] = await conn('summary_drafts')
    .where({ network_id: networkId })
    .orderBy([
      { column: 'month', order: 'desc' },
      { column: 'revision', order: 'desc' },
    ])
    .select(COLUMNS);
  return rows.map(rowOf);
}

/** The latest revision of a month, issued or on its way. */
export async function findLatestDraft(
  networkId: number,
  month: string,
  conn: Connection = pool(),
): Promise<SummaryDraftRow | undefined> {
  const row: SummaryDraftRow | undefined = await conn('summary_drafts')
    .where({ network_id: networkId, month })
    .orderBy('revision', 'desc')
    .first(COLUMNS);
  return row && rowOf(row);
}

/** A revision’s row, locked until the transaction ends. */
export async function lockDraft(
  key: RevisionKey,
  transaction: Connection,
): Promise<SummaryDraftRow | undefined> {
  const row: SummaryDraftRow | undefined = await transaction('summary_drafts')
    .where(keyOf(key))
    .forUpdate()
    .first(COLUMNS);
  return row && rowOf(row);
}

/** Revisions whose figures wait to be made, or that wait to be issued; the longest waiting first. */
export async function listWaitingDrafts(conn: Connection = pool()): Promise<SummaryDraftRow[]> {
  const rows: SummaryDraftRow[] = await conn('summary_drafts')
    .whereIn('state', ['draft', 'review', 'issuing'])
    .where((query) => query.whereNull('computed_at').orWhere({ state: 'issuing' }))
    .orderByRaw('COALESCE(requested_at, drafted_at)')
    .select(COLUMNS);
  return rows.map(rowOf);
}

/** Issued revisions that no later revision follows: what is compared with the data. */
export async function listWatchedDrafts(conn: Connection = pool()): Promise<SummaryDraftRow[]> {
  const rows: SummaryDraftRow[] = await conn('summary_drafts as d')
    .where({ 'd.state': 'issued' })
    .whereNotExists((query) =>
      query
        .from('summary_drafts as later')
        .whereRaw('later.network_id = d.network_id AND later.month = d.month AND later.revision > d.revision')
        .select(conn.raw('1')),
    )
    .orderBy(['network_id', 'month'])
    .select(COLUMNS);
  return rows.map(rowOf);
}

export interface DraftChanges {
  state?: DraftState;
  computedAt?: Date | null;
  documentSha256?: Buffer | null;
  dataSha256?: Buffer | null;
  figures?: StationFigures[];
  progress?: number;
  failure?: string | null;
  submitted?: { by: string; at: Date } | null;
  requested?: { by: string; at: Date; note: string } | null;
  fingerprint?: Buffer | null;
}

/** Changes a revision’s row; what is left out stays. */
export async function updateDraft(
  key: RevisionKey,
  changes: DraftChanges,
  conn: Connection = pool(),
): Promise<void> {
  const { submitted, requested, figures, fingerprint } = changes;
  const columns = {
    state: changes.state,
    computed_at: changes.computedAt,
    document_sha256: changes.documentSha256,
    data_sha256: changes.dataSha256,
    figures: figures === undefined ? undefined : JSON.stringify(figures),
    progress: changes.progress,
    failure: typeof changes.failure === 'string' ? changes.failure.slice(0, 500) : changes.failure,
    ...(submitted === undefined
      ? {}
      : { submitted_by: submitted?.by ?? null, submitted_at: submitted?.at ?? null }),
    ...(requested === undefined
      ? {}
      : {
          requested_by: requested?.by ?? null,
          requested_at: requested?.at ?? null,
          note: requested?.note ?? '',
        }),
    ...(fingerprint === undefined ? {} : { fingerprint, fingerprint_at: new Date() }),
  };
  const given = Object.fromEntries(Object.entries(columns).filter(([, value]) => value !== undefined));
  await conn('summary_drafts').where(keyOf(key)).update(given);
}

/** Deletes a revision that is not issued. */
export async function deleteDraft(key: RevisionKey, conn: Connection): Promise<void> {
  await conn('summary_drafts').where(keyOf(key)).whereNot({ state: 'issued' }).delete();
}

/** What a list shows of a revision. */
export type DraftHead = Pick<SummaryDraftRow, 'month' | 'revision' | 'state'>;

/** Revisions of a network without their figures; latest month and revision first. */
export async function listDraftHeads(networkId: number, conn: Connection = pool()): Promise<DraftHead[]> {
  return conn('summary_drafts')
    .where({ network_id: networkId })
    .orderBy([
      { column: 'month', order: 'desc' },
      { column: 'revision', order: 'desc' },
    ])
    .select('month', 'revision', 'state');
}
