import type { Content } from 'pdfmake/interfaces';
import type { Summary, SummaryStation } from '#lib/contracts/summaries';
import { formatCoverage, formatLevelDb } from '#lib/format/levels';
import { formatMonth } from '#lib/format/times';
import { BELOW_MINIMUM, markedLevelText } from '../figures';
import { CAUTIONS, complaintsSentence, instantText, methodStatement } from '../statement';
import { BOOK_TABLE, cell, head, heading, paragraph, RUST, SOFT_INK } from './typography';

/** First pages: whose month this is, every station in a line, how the figures are made, room to sign. */
export function overview(summary: Summary): Content[] {
  const { network, month, timeZone, generatedAt, isToDate } = summary;
  return [
    { text: network.name, color: SOFT_INK, fontSize: 11 },
    {
      text: `Noise summary, ${formatMonth(month)}${isToDate ? ', to date' : ''}`,
      bold: true,
      fontSize: 20,
      margin: [0, 2, 0, 4],
    },
    {
      text: [
        { text: 'Draft, not issued. ', bold: true, color: RUST },
        `Generated ${instantText(generatedAt, timeZone)}; figures follow the data as of then.`,
        isToDate ? ' The month, or its last night, is not over: every figure is to date.' : '',
      ],
      margin: [0, 0, 0, 10],
    },
    heading('Stations'),
    stationsTable(summary.stations),
    {
      text: `Levels in dB re 20 µPa. ${BELOW_MINIMUM} coverage below the minimum.`,
      color: SOFT_INK,
      fontSize: 8,
      margin: [0, 4, 0, 4],
    },
    paragraph(complaintsSentence(summary)),
    heading('Cautions'),
    ...CAUTIONS.map(paragraph),
    signatures(),
    { ...(heading('How these figures are made') as object), pageBreak: 'before' } as Content,
    ...methodStatement(summary).map(paragraph),
  ];
}

function stationsTable(stations: readonly SummaryStation[]): Content {
  const heads = ['Lday', 'Levening', 'Lnight', 'Lden', 'LAeq', 'LAFmax', 'Coverage', 'Exceedances'];
  return {
    layout: BOOK_TABLE,
    table: {
      headerRows: 1,
      widths: ['*', ...heads.map(() => 'auto' as const)],
      body: [[head('Station', 'left'), ...heads.map((text) => head(text))], ...stations.map(stationRow)],
    },
  };
}

function stationRow({ code, name, figures, exceedances }: SummaryStation) {
  const { periods } = figures;
  const lifted = exceedances.lifted === 0 ? '' : ` (${exceedances.lifted} lifted)`;
  return [
    cell(`${code} ${name}`, 'left'),
    cell(markedLevelText(figures.Lday, periods.day.meetsMinimum)),
    cell(markedLevelText(figures.Levening, periods.evening?.meetsMinimum ?? true)),
    cell(markedLevelText(figures.Lnight, periods.night.meetsMinimum)),
    cell(markedLevelText(figures.Lden, periods.whole.meetsMinimum)),
    cell(markedLevelText(figures.LAeq, figures.meetsMinimum)),
    cell(formatLevelDb(figures.LAFmax)),
    cell(formatCoverage(figures.coverage)),
    cell(`${exceedances.standing}${lifted}`),
  ];
}

function signatures(): Content {
  const line = (text: string): Content => ({
    stack: [
      { canvas: [{ type: 'line', x1: 0, y1: 0, x2: 205, y2: 0, lineWidth: 0.6, lineColor: SOFT_INK }] },
      { text, color: SOFT_INK, fontSize: 8, margin: [0, 3, 0, 0] },
    ],
  });
  return {
    columns: [line('Prepared by, date'), line('Reviewed by, date')],
    columnGap: 40,
    margin: [0, 44, 0, 0],
    unbreakable: true,
  } as Content;
}
