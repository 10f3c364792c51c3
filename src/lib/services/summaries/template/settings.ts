import { appendAudit } from '#db/queries/audit';
import { inTransaction, pool, type Connection } from '#db/queries/connection';
import {
  insertSummarySettings,
  listSummarySettings,
  type SummarySettingsRow,
} from '#db/queries/summarySettings';
import { DEFAULT_GRACE_DAYS, type SummarySettings } from '#lib/contracts/summarySettings';
import { DEFAULT_SUMMARY_TEMPLATE } from '#lib/contracts/summaryTemplate';
import { keepFile, readKeptFile } from '../../files/keptFile';
import { done, invalid, unknown, type Outcome } from '../../outcome';
import { plainPhoto } from '../../photos/plainPhoto';
import { type SummaryMark } from '../document/render';

/** What a network’s summaries go by now, and the mark of their first page. */
export interface SummarySettingsNow extends SummarySettings {
  /** 0: nobody has set anything. */
  version: number;
  mark: { sha256: Buffer; mediaType: SummaryMark['mediaType'] } | null;
}

/** What to do with the mark: `keep` the one there is, take a file’s bytes, or have none (null). */
export type MarkChange = 'keep' | Uint8Array | null;

export async function summarySettings(
  networkId: number,
  conn: Connection = pool(),
): Promise<SummarySettingsNow> {
  const [latest] = await listSummarySettings(networkId, conn);
  return latest ? settingsOf(latest) : NOTHING_SET;
}

/** Every version of a network’s settings, latest first. */
export function summarySettingsVersions(networkId: number): Promise<SummarySettingsRow[]> {
  return listSummarySettings(networkId);
}

/** Sets what holds from now on, as a new version; what is issued stays as it is. The audit entry holds no texts. */
export async function changeSummarySettings(
  act: { networkId: number; userId: string },
  settings: SummarySettings,
  markChange: MarkChange,
): Promise<Outcome<number>> {
  const before = await summarySettings(act.networkId);
  const mark = markChange === 'keep' ? before.mark : await keptMark(markChange);
  if (mark === undefined) return invalid('mark', 'must be a whole PNG or JPEG file');
  return addVersion(act, { ...settings, mark });
}

/** Makes what an earlier version said hold again, as a new version. */
export async function restoreSummarySettings(
  act: { networkId: number; userId: string },
  version: number,
): Promise<Outcome<number>> {
  const row = (await listSummarySettings(act.networkId)).find((one) => one.version === version);
  return row ? addVersion(act, settingsOf(row)) : unknown('The network has no such version.');
}

/** The mark’s bytes; null where there is none, or its file is gone. */
export async function readMark(mark: SummarySettingsNow['mark']): Promise<SummaryMark | null> {
  const bytes = mark && (await readKeptFile('marks', mark.sha256));
  return mark && bytes ? { bytes, mediaType: mark.mediaType } : null;
}

/** A mark as it is printed, from a file’s bytes and by nothing that its sender says; null for anything but a whole PNG or JPEG. */
export function markOf(bytes: Uint8Array): SummaryMark | null {
  const plain = plainPhoto(bytes);
  return plain && { bytes: plain.bytes, mediaType: plain.type };
}

const NOTHING_SET: SummarySettingsNow = {
  version: 0,
  graceDays: DEFAULT_GRACE_DAYS,
  template: DEFAULT_SUMMARY_TEMPLATE,
  mark: null,
};

function settingsOf({ version, graceDays, template, markSha256, markMediaType }: SummarySettingsRow) {
  const mark =
    markSha256 === null ? null : { sha256: markSha256, mediaType: markMediaType as SummaryMark['mediaType'] };
  return { version, graceDays, template, mark } satisfies SummarySettingsNow;
}

/** Undefined: what was sent is no mark. */
async function keptMark(bytes: Uint8Array | null): Promise<SummarySettingsNow['mark'] | undefined> {
  if (bytes === null) return null;
  const mark = markOf(bytes);
  return mark ? { sha256: await keepFile('marks', mark.bytes), mediaType: mark.mediaType } : undefined;
}

function addVersion(
  { networkId, userId }: { networkId: number; userId: string },
  { graceDays, template, mark }: Omit<SummarySettingsNow, 'version'>,
): Promise<Outcome<number>> {
  return inTransaction(async (transaction) => {
    const { version: before } = await summarySettings(networkId, transaction);
    const version = before + 1;
    const row = { networkId, version, graceDays, template };
    await insertSummarySettings(
      { ...row, markSha256: mark?.sha256 ?? null, markMediaType: mark?.mediaType ?? null },
      userId,
      transaction,
    );
    const { sections, metrics, language } = template;
    await appendAudit(
      {
        userId,
        networkId,
        action: 'summary-settings.change',
        subject: `version ${version}`,
        detail: { graceDays, sections, metrics, language, mark: mark?.sha256.toString('hex') ?? null },
      },
      transaction,
    );
    return done(version);
  });
}
