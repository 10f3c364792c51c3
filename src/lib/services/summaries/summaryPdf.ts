import type { Summary } from '#lib/contracts/summaries';
import { overview } from './pdf/overview';
import { FONT, printPdf } from './pdf/printer';
import { stationPages } from './pdf/stationPages';
import { INK, SOFT_INK } from './pdf/typography';
import { formatMonth } from '#lib/format/times';

/** The month as an A4 document to read, print and sign; every page says what it is and that it is a draft. */
export function summaryPdf(summary: Summary): Promise<Buffer> {
  const name = `${summary.network.name}, noise summary ${formatMonth(summary.month)}`;
  return printPdf({
    pageSize: 'A4',
    pageMargins: [57, 57, 57, 62],
    language: 'en-GB',
    displayTitle: true,
    info: { title: name, creator: 'Bittern', creationDate: new Date(summary.generatedAt) },
    defaultStyle: { font: FONT, fontSize: 9, color: INK },
    content: [
      ...overview(summary),
      ...summary.stations.flatMap((station) => stationPages(station, summary.timeZone)),
    ],
    footer: (page, pages) => ({
      columns: [
        { text: `${name}${summary.isToDate ? ', to date' : ''} · draft, not issued`, width: '*' },
        { text: `${page} of ${pages}`, width: 'auto' },
      ],
      margin: [57, 24, 57, 0],
      fontSize: 8,
      color: SOFT_INK,
    }),
  });
}
