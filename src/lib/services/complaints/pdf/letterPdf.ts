import type { Content } from 'pdfmake/interfaces';
import type { EvidencePack, PackItem } from '#lib/contracts/evidencePack';
import { formatLocalDate } from '#lib/format/times';
import type { LocalDate } from '#lib/time/zone';
import { FONT, printPdf } from '../../summaries/pdf/printer';
import { INK, SOFT_INK, typeset } from '../../summaries/pdf/typography';
import { evidencePages } from './evidencePages';

const LETTER_SIZE = 10;
/** The signature and what stands before it stay together. */
const CLOSING_PARAGRAPHS = 2;
/** Points at the left and right. */
const MARGIN = 62;

/** What a letter in print is made from. */
export interface PrintedLetter {
  networkName: string;
  reference: string;
  recipient: { name: string | null; address: string | null };
  /** Of the letter, in the network's zone. */
  date: LocalDate;
  /** The letter with its fields filled in. */
  text: string;
  items: readonly PackItem[];
  pack: EvidencePack;
}

/** An answer in print: the letter, laid out for a window envelope, and the evidence that goes with it. */
export function letterPdf(letter: PrintedLetter): Promise<Buffer> {
  const title = `Answer to ${letter.reference}`;
  return printPdf({
    pageSize: 'A4',
    pageMargins: [MARGIN, 57, MARGIN, 62],
    language: 'en-GB',
    displayTitle: true,
    info: { title, creator: 'Bittern', creationDate: new Date(`${letter.date}T12:00:00Z`) },
    defaultStyle: { font: FONT, fontSize: 9, color: INK },
    content: [...letterPage(letter), ...evidencePages(letter)],
    pageBreakBefore: (node, query) =>
      node.headlineLevel === 1 && query.getFollowingNodesOnPage().length === 0,
    footer: (page, pages) => ({
      columns: [
        { text: `${letter.networkName} · ${letter.reference}`, width: '*' },
        { text: `${page} of ${pages}`, width: 'auto' },
      ],
      margin: [MARGIN, 24, MARGIN, 0],
      fontSize: 8,
      color: SOFT_INK,
    }),
  });
}

function letterPage({ networkName, reference, recipient, date, text, items }: PrintedLetter): Content[] {
  const lines = [recipient.name, ...(recipient.address ?? '').split('\n')].filter((line) => line);
  const paragraphs = text.split(/\n{2,}/);
  const enclosed =
    items.length === 0
      ? []
      : [
          {
            text: 'Enclosed: the measurements behind this letter, on the following pages.',
            color: SOFT_INK,
            margin: [0, 10, 0, 0],
          } as Content,
        ];
  return [
    { text: networkName, bold: true, fontSize: 13 },
    {
      columns: [
        // The height of an address of six lines, so that the letter begins at the same place.
        { text: lines.join('\n'), fontSize: LETTER_SIZE, width: '*', lineHeight: 1.2 },
        {
          width: 'auto',
          alignment: 'right',
          lineHeight: 1.2,
          text: [formatLocalDate(date), '\n', { text: `Our reference ${reference}`, color: SOFT_INK }],
        },
      ],
      margin: [0, 48, 0, 26],
    },
    ...paragraphs.slice(0, -CLOSING_PARAGRAPHS).map(letterParagraph),
    // A name does not go over to a page of its own.
    {
      stack: [...paragraphs.slice(-CLOSING_PARAGRAPHS).map(letterParagraph), ...enclosed],
      unbreakable: true,
    },
  ];
}

function letterParagraph(text: string): Content {
  return { ...typeset(text, LETTER_SIZE), lineHeight: 1.15, margin: [0, 0, 0, 7] };
}
