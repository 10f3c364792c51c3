import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type SummaryTemplate } from '#lib/contracts/summaryTemplate';
import { csvZip } from './csvFiles';
import { renderPdf, methodSentences } from './pdf/renderPdf';
import { topicTables } from './tables/topics';
import { wordsOf } from './words/words';
import { workbook, type Facts } from './workbook';

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
  seal?: {
    dataSha256: string;
    /** Of the months before, where there are any. */
    yearSha256: string | null;
    softwareVersion: string;
    publicKey: string | null;
  } | null;
  /** Head of the audit chain when it was issued. */
  chainHead?: { position: number; sha256: string } | null;
  /** Address of the page that verifies a file. */
  verifyUrl?: string | null;
}

export const FILE_FORMATS = ['pdf', 'xlsx', 'csv', 'json'] as const;
export type FileFormat = (typeof FILE_FORMATS)[number];

/** A finished file of a month. */
export interface RenderedFile {
  name: string;
  mediaType: string;
  bytes: Uint8Array;
}

/** A month’s file in a format; all formats are written from the one document. */
export function renderFile(
  doc: MonthDocument,
  context: RenderContext,
  format: FileFormat,
): Promise<RenderedFile> {
  return RENDERERS[format](doc, context);
}

/** File name of a month: `merrow-2026-03-r2.pdf`, `merrow-2026-03-draft.pdf`. */
export function fileName(
  { network, month }: Pick<MonthDocument, 'network' | 'month'>,
  { revision }: Pick<RenderContext, 'revision'>,
  ending: string,
): string {
  return `${network.slug}-${month}-${revision === null ? 'draft' : `r${revision}`}.${ending}`;
}

type Renderer = (doc: MonthDocument, context: RenderContext) => Promise<RenderedFile>;

const RENDERERS: Record<FileFormat, Renderer> = {
  pdf: async (doc, context) => ({
    name: fileName(doc, context, 'pdf'),
    mediaType: 'application/pdf',
    bytes: await renderPdf(doc, context),
  }),
  xlsx: async (doc, context) => ({
    name: fileName(doc, context, 'xlsx'),
    mediaType: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
    bytes: await workbook(topicTables(doc), factsOf(doc, context), paragraphsOf(doc, context)),
  }),
  csv: (doc, context) =>
    Promise.resolve({
      name: fileName(doc, context, 'csv.zip'),
      mediaType: 'application/zip',
      bytes: csvZip(doc, topicTables(doc)),
    }),
  json: (doc, context) =>
    Promise.resolve({
      name: fileName(doc, context, 'json'),
      mediaType: 'application/json',
      // An issued month’s is the document itself; a draft tells that it is one.
      bytes: Buffer.from(
        `${JSON.stringify(context.revision === null ? { ...doc, status: 'draft' } : doc)}\n`,
      ),
    }),
};

function factsOf(
  doc: MonthDocument,
  { revision, issuedBy, seal, chainHead, verifyUrl }: RenderContext,
): Facts {
  return [
    ['network', `${doc.network.name} (${doc.network.slug})`],
    ['month', doc.month],
    ['state', revision === null ? 'draft, not issued' : `issued, revision ${revision}`],
    ...(issuedBy ? [['issued by', `${issuedBy.name}, ${issuedBy.at}`] as const] : []),
    ['computed', doc.generatedAt],
    ['to date', doc.isToDate ? 'yes: the month, or its last night, is not over' : 'no'],
    ['from', doc.from],
    ['to', doc.to],
    ['nights to', doc.nightsTo],
    ['time zone', doc.timeZone],
    ['levels', 'dB re 20 µPa, unrounded in the cells; times are UTC, dates local'],
    ['form', doc.form],
    ...(seal
      ? ([
          ['data SHA-256', seal.dataSha256],
          ...(seal.yearSha256 === null
            ? []
            : [['SHA-256 of the sums of the months before', seal.yearSha256] as const]),
          ['software', seal.softwareVersion],
          ...(seal.publicKey === null ? [] : [['public key', seal.publicKey] as const]),
        ] as const)
      : []),
    ...(chainHead ? [['audit chain', `${chainHead.position}, ${chainHead.sha256}`] as const] : []),
    ...(verifyUrl ? [['verify at', verifyUrl] as const] : []),
  ];
}

function paragraphsOf(doc: MonthDocument, { template }: RenderContext): string[] {
  const words = wordsOf(template.language);
  return [...methodSentences(doc, words), ...words.cautions];
}
