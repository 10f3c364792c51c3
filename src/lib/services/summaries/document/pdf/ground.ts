import { type MonthDocument } from '#lib/contracts/monthDocument';
import { type SummarySection } from '#lib/contracts/summaryTemplate';
import { type RenderContext } from '../render';
import { type ChartGround } from './charts';

/** What every part of the document is written with. */
export interface PdfGround extends ChartGround {
  doc: MonthDocument;
  context: RenderContext;
}

/** Whether the network’s template shows a part. */
export function shows({ context }: PdfGround, section: SummarySection): boolean {
  return context.template.sections.includes(section);
}
