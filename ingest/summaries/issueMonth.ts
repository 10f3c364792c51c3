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
import { type FigureChange } from '#lib/contracts/summaryLife';
import { keepFile, removeKeptFile } from '#lib/services/files/keptFile';
import { softwareVersion } from '#lib/services/softwareVersion';
import { renderFiles, type RenderedFile } from '#lib/services/summaries/document/render';
import { changedFigures } from '#lib/services/summaries/life/changedFigures';
import { differencesSinceIssue } from '#lib/services/summaries/life/differences';
import { keepDocument, readDocument } from '#lib/services/summaries/life/document';
import { keptFigures, measureMonth, type MeasuredMonth } from '#lib/services/summaries/life/measure';
import { signingKey, signWith } from '#lib/services/summaries/seal/keys';
import { formatOf, manifestText } from '#lib/services/summaries/seal/manifest';
import { readMark, summarySettings } from '#lib/services/summaries/template/settings';
import { tellIssued } from './tellIssued';

/**
 * Issues the revision that somebody asked to be issued: its figures are made anew, and where they differ from those that were reviewed,
 * nothing is issued and it goes back to review. Files are durable before the row that names them.
 */
export async function issueMonth(draft: SummaryDraftRow, now: Date): Promise<void> {
  const network = await findNetworkById(draft.networkId);
  const person = draft.requestedBy === null ? undefined : await findUserById(draft.requestedBy);
  if (!network || !person) throw new Error('Nobody is known to issue it.');
  const measured = await measureMonth(network, draft.month, now, (progress) => {
    void updateDraft(draft, { progress }).catch(() => undefined);
  });
  const reviewed = draft.documentSha256 && (await readDocument(draft.documentSha256));
  const moved = reviewed ? changedFigures(reviewed, measured.doc) : null;
  if (moved === null || moved.length > 0) {
    await backToReview(draft, measured, moved?.length ?? 0, now);
    return;
  }
  await seal({ draft, network, person, measured, now });
}

interface Issue {
  draft: SummaryDraftRow;
  network: NetworkRow;
  person: UserRow;
  measured: MeasuredMonth;
  now: Date;
}

async function seal(issue: Issue): Promise<void> {
  const { draft, network, person, measured, now } = issue;
  const [before = null] = await listIssued(network.id, draft.month);
  const settings = await summarySettings(network.id);
  const key = await signingKey(network.id);
  const [software, head] = await Promise.all([softwareVersion(), auditHead()]);
  const rendered = await renderFiles(measured.doc, {
    template: settings.template,
    mark: await readMark(settings.mark),
    revision: draft.revision,
    issuedBy: { name: person.name, at: now.toISOString() },
    seal: {
      dataSha256: measured.data.sha256,
      softwareVersion: software,
      publicKey: key.sha256.toString('hex'),
    },
    chainHead: head,
    verifyUrl: `${config().origin}/verify`,
  });
  const files = await Promise.all(rendered.map(keptFile));
  const manifest = manifestText(measured.doc, {
    network,
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
    templateVersion: settings.version,
    software,
    auditHead: head,
    publicKey: key.sha256.toString('hex'),
  });
  const changes = before && (await differencesSinceIssue(network, before, now, measured)).changes;
  await record(issue, { manifest, key, files, changes });
}

async function record(
  { draft, network, person, measured, now }: Issue,
  {
    manifest,
    key,
    files,
    changes,
  }: {
    manifest: string;
    key: SummaryKeyRow;
    files: Omit<IssuedFileRow, 'summaryId'>[];
    changes: FigureChange[] | null;
  },
): Promise<void> {
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
      figures: keptFigures(measured.doc),
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
        fingerprint: measured.fingerprint,
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
  const reviewed = draft.documentSha256;
  if (reviewed && !files.some(({ sha256 }) => sha256.equals(reviewed))) {
    await removeKeptFile('summaries', reviewed);
  }
}

async function keptFile({ name, mediaType, bytes }: RenderedFile): Promise<Omit<IssuedFileRow, 'summaryId'>> {
  const sha256 = await keepFile('summaries', bytes);
  return { format: formatOf(name), name, mediaType, byteCount: bytes.length, sha256 };
}

async function backToReview(
  draft: SummaryDraftRow,
  { doc, data }: MeasuredMonth,
  moved: number,
  now: Date,
): Promise<void> {
  const documentSha256 = await keepDocument(doc);
  await updateDraft(draft, {
    state: 'review',
    requested: null,
    computedAt: now,
    documentSha256,
    dataSha256: Buffer.from(data.sha256, 'hex'),
    figures: keptFigures(doc),
    progress: 0,
    failure:
      moved === 0
        ? 'Nothing was issued: the figures that were reviewed are gone. These were made anew: look at them again.'
        : `Nothing was issued: ${moved} ${moved === 1 ? 'figure has' : 'figures have'} changed since it was reviewed. These are the new ones: look at them again.`,
  });
  if (draft.documentSha256) await removeKeptFile('summaries', draft.documentSha256);
}
