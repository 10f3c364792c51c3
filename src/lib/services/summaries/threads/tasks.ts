import { type NetworkRow } from '#db/queries/networks';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type FigureChange, type StationFigures } from '#lib/contracts/summaryLife';
import { type SummaryManifest } from '#lib/contracts/summaryManifest';
import { type FileFormat, type RenderContext, type RenderedFile } from '../document/render';

/** Which month is computed, and as of when. */
export interface MeasureTask {
  network: NetworkRow;
  month: string;
  asOf: Date;
  /** Digest of the figures that were reviewed, to be compared with, and with those of the revision before; null: a draft. */
  reviewed: string | null;
}

/** A computed month: its figures are kept as a file, and only what its row and its manifest say is handed on. */
export interface KeptMonth extends Pick<SummaryManifest, 'data' | 'limits' | 'settings'> {
  /** Names the file of its figures. */
  documentSha256: string;
  /** Of what the figures rest on. */
  fingerprint: string;
  figures: StationFigures[];
  /** How many figures differ from the reviewed ones; null: they are gone, or none were given. */
  moved: number | null;
  /** Figures that differ from the revision before, and why; null: there is none, or it was not asked. */
  changes: FigureChange[] | null;
}

/** A file that was written into the data directory. */
export interface KeptFile extends Pick<RenderedFile, 'name' | 'mediaType'> {
  byteCount: number;
  sha256: string;
}

/** Figures that are kept, or those of a month as of an instant. */
export type DocumentSource = { documentSha256: string } | { month: string; asOf: Date };

export interface DocumentTask {
  network: NetworkRow;
  source: DocumentSource;
}

export interface RenderTask extends DocumentTask {
  context: RenderContext;
  format: FileFormat;
}

/** What is done with whole months. */
export interface MonthWork {
  /** Computes a month and keeps its figures. */
  measure: { task: MeasureTask; result: KeptMonth };
  /** What would differ if the latest issued revision of a month were issued again now. */
  compare: { task: { network: NetworkRow; month: string; now: Date }; result: FigureChange[] | null };
  /** Writes a file of figures that were just kept into the data directory. */
  keep: { task: Omit<RenderTask, 'source'> & { documentSha256: string }; result: KeptFile };
  /** Writes a file for who asked; null where the figures are gone or the month has not begun. */
  render: { task: RenderTask; result: RenderedFile | null };
  /** The figures themselves; null where they are gone or the month has not begun. */
  document: { task: DocumentTask; result: MonthDocument | null };
}

export type MonthTask = {
  [Kind in keyof MonthWork]: { kind: Kind } & MonthWork[Kind]['task'];
}[keyof MonthWork];
export type MonthResult = MonthWork[keyof MonthWork]['result'];
