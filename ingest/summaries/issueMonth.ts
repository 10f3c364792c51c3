import { createHash } from 'node:crypto';
import { appendAudit } from '#db/queries/audit';
import { auditHead } from '#db/queries/auditLog';
import { inTransaction } from '#db/queries/connection';
import {
  insertIssued,
  listIssued,
  type IssuedFileRow,
  type IssuedSummaryRow,
} from '#db/queries/issuedSummaries';
import { findNetworkById, type NetworkRow } from '#db/queries/networks';
import { lockDraft, updateDraft, type SummaryDraftRow } from '#db/queries/summaryDrafts';
import { type SummaryKeyRow } from '#db/queries/summaryKeys';
import { replaceOpenProposals } from '#db/queries/summaryProposals';
import { findUserById, type UserRow } from '#db/queries/users';
import { config } from '#lib/config/index';
import { removeKeptFile } from '#lib/services/files/keptFile';
import { softwareVersion } from '#lib/services/softwareVersion';
import { FILE_FORMATS, type RenderContext } from '#lib/services/summaries/document/render';
import { signingKey, signWith } from '#lib/services/summaries/seal/keys';
import { manifestText } from '#lib/services/summaries/seal/manifest';
import { readMark, summarySettings } from '#lib/services/summaries/template/settings';
import { monthWork } from '#lib/services/summaries/threads/months';
import { type KeptMonth } from '#lib/services/summaries/threads/tasks';
import { tellIssued } from './tellIssued';

/**
 * Issues the revision that somebody asked to be issued: its figures are made anew, and where they differ from those that were reviewed,
 * nothing is issued and it goes back to review. Files are durable before the row that names them.
 */
export async function issueMonth(draft: SummaryDraftRow, now: Date): Promise<void> {
  const network = await findNetworkById(draft.networkId);
  const person = draft.requestedBy === null ? undefined : await findUserById(draft.requestedBy);
  if (!network || !person) throw new Error('Nobody is known to issue it.');
  const reviewed = draft.documentSha256?.toString('hex') ?? null;
  const measured = await monthWork(
    'measure',
    { network, month: draft.month, asOf: now, reviewed },
    {
      onProgress: ({ done }) => {
        void updateDraft(draft, { progress: done }).catch(() => undefined);
      },
    },
  );
  if (measured.moved !== 0) {
    await backToReview(draft, measured, now);
    return;
  }
  await seal({ draft, network, person, measured, now });
}

interface Issue {
  draft: SummaryDraftRow;
  network: NetworkRow;
  person: UserRow;
  measured: KeptMonth;
  now: Date;
}

async function seal(issue: Issue): Promise<void> {
  const { draft, network, person, measured, now } = issue;
  const [before = null] = await listIssued(network.id, draft.month);
  const settings = await summarySettings(network.id);
  const key = await signingKey(network.id);
  const [software, head] = await Promise.all([softwareVersion(), auditHead()]);
  const files = await printed(network, measured, {
    template: settings.template,
    mark: await readMark(settings.mark),
    revision: draft.revision,
    issuedBy: { name: person.name, at: now.toISOString() },
    seal: {
      dataSha256: measured.data.sha256,
      yearSha256: draft.month.endsWith('-01') ? null : (measured.data.year?.sha256 ?? null),
      softwareVersion: software,
      publicKey: key.sha256.toString('hex'),
    },
    chainHead: head,
    verifyUrl: `${config().origin}/verify`,
  });
  const manifest = manifestText({
    network,
    month: draft.month,
    revision: draft.revision,
    supersedes: before,
    issuedAt: now,
    issuedBy: person.name,
    files: files.map(({ byteCount, sha256, ...file }) => ({
      ...file,
      bytes: byteCount,
      sha256: sha256.toString('hex'),
    })),
    data: measured.data,
    limits: measured.limits,
    settings: measured.settings,
    templateVersion: settings.version,
    software,
    auditHead: head,
    publicKey: key.sha256.toString('hex'),
  });
  await record(issue, { manifest, key, files });
}

async function record(
  { draft, network, person, measured, now }: Issue,
  {
    manifest,
    key,
    files,
  }: { manifest: string; key: SummaryKeyRow; files: Omit<IssuedFileRow, 'summaryId'>[] },
): Promise<void> {
  const { changes } = measured;
  const manifestSha256 = createHash('sha256').update(manifest).digest();
  await inTransaction(async (transaction) => {
    const current = await lockDraft(draft, transaction);
    if (current?.state !== 'issuing') return;
    const issued: Omit<IssuedSummaryRow, 'id'> = {
      networkId: network.id,
      month: draft.month,
      revision: draft.revision,
      issuedBy: person.id,
      issuedByName: person.name,
      issuedAt: now,
      note: draft.note,
      figures: measured.figures,
      changes,
      keyId: key.id,
      manifest,
      manifestSha256,
      signature: signWith(key, manifest),
    };
    await insertIssued(issued, files, transaction);
    await updateDraft(
      draft,
      {
        state: 'issued',
        failure: null,
        progress: 0,
        documentSha256: null,
        fingerprint: Buffer.from(measured.fingerprint, 'hex'),
      },
      transaction,
    );
    await replaceOpenProposals({ networkId: network.id, month: draft.month }, null, transaction);
    await tellIssued(network, issued, transaction);
    const digest = manifestSha256.toString('hex');
    await appendAudit(
      {
        userId: person.id,
        networkId: network.id,
        action: 'summary.issue',
        subject: `summary ${draft.month} revision ${draft.revision}`,
        detail: { manifestSha256: digest, dataSha256: measured.data.sha256, changes: changes?.length ?? 0 },
      },
      transaction,
    );
  });
  const drafted = [draft.documentSha256, Buffer.from(measured.documentSha256, 'hex')];
  for (const digest of drafted) {
    if (digest && !files.some(({ sha256 }) => sha256.equals(digest)))
      await removeKeptFile('summaries', digest);
  }
}

/** Files of kept figures, one made after the other: together a hundred stations’ would take twice the memory. */
async function printed(
  network: NetworkRow,
  { documentSha256 }: KeptMonth,
  context: RenderContext,
): Promise<Omit<IssuedFileRow, 'summaryId'>[]> {
  const files: Omit<IssuedFileRow, 'summaryId'>[] = [];
  for (const format of FILE_FORMATS) {
    const kept = await monthWork('keep', { network, documentSha256, context, format });
    files.push({ ...kept, format, sha256: Buffer.from(kept.sha256, 'hex') });
  }
  return files;
}

async function backToReview(
  draft: SummaryDraftRow,
  { documentSha256, data, figures, moved }: KeptMonth,
  now: Date,
): Promise<void> {
  await updateDraft(draft, {
    state: 'review',
    requested: null,
    computedAt: now,
    documentSha256: Buffer.from(documentSha256, 'hex'),
    dataSha256: Buffer.from(data.sha256, 'hex'),
    figures,
    progress: 0,
    failure:
      moved === null
        ? 'Nothing was issued: the figures that were reviewed are gone. These were made anew: look at them again.'
        : `Nothing was issued: ${moved} ${moved === 1 ? 'figure has' : 'figures have'} changed since it was reviewed. These are the new ones: look at them again.`,
  });
  if (draft.documentSha256) await removeKeptFile('summaries', draft.documentSha256);
}
