import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type SummaryTemplate } from '#lib/contracts/summaryTemplate';

/** A network’s mark as it was uploaded. */
export interface SummaryMark {
  bytes: Uint8Array;
  mediaType: 'image/png' | 'image/jpeg';
}

/** What stands in the files beside the figures. */
export interface RenderContext {
  template: SummaryTemplate;
  mark?: SummaryMark | null;
  /** Number of the issued revision; null: a draft. */
  revision: number | null;
  /** Who issued it, and when. */
  issuedBy?: { name: string; at: string } | null;
  /** What the manifest rests on. */
  seal?: { dataSha256: string; softwareVersion: string; publicKey: string | null } | null;
  /** Head of the audit chain when it was issued. */
  chainHead?: { position: number; sha256: string } | null;
  /** Address of the page that verifies a file. */
  verifyUrl?: string | null;
}

/** A finished file of a month. */
export interface RenderedFile {
  name: string;
  mediaType: string;
  bytes: Uint8Array;
}

/** A month’s files, all written from the one document. */
export async function renderFiles(doc: MonthDocument, context: RenderContext): Promise<RenderedFile[]> {
  return Promise.resolve([renderJson(doc, context)]);
}

/** File name of a month: `merrow-2026-03-r2.pdf`, `merrow-2026-03-draft.pdf`. */
export function fileName(
  { network, month }: MonthDocument,
  { revision }: Pick<RenderContext, 'revision'>,
  ending: string,
): string {
  return `${network.slug}-${month}-${revision === null ? 'draft' : `r${revision}`}.${ending}`;
}

function renderJson(doc: MonthDocument, context: RenderContext): RenderedFile {
  return {
    name: fileName(doc, context, 'json'),
    mediaType: 'application/json',
    bytes: Buffer.from(`${JSON.stringify(doc)}\n`),
  };
}
