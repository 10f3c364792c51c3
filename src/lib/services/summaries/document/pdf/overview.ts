import { type DocumentLimit, type DocumentStation } from '#lib/contracts/monthDocument';
import { type SummaryMetric } from '#lib/contracts/summaryTemplate';
import { BELOW_MINIMUM } from '../format';
import { RUST, SMALL, SOFT_INK } from './fonts';
import { shows, type PdfGround } from './ground';
import { LEFT, PAGE, RIGHT } from './pages';
import { table, type TableColumn } from './table';

const MARK_HEIGHT = 42;

/** First page: whose month this is and how it stands, every station in a line, limits and how they were kept. */
export function overview(ground: PdfGround): void {
  const { pages, words, doc, context } = ground;
  const { template } = context;
  const title = words.title(doc.month);
  pages.section(title, { newPage: false });
  drawMark(ground);
  pages.paragraph(template.networkName ?? doc.network.name, { size: 11, colour: SOFT_INK }, 1);
  pages.heading(1, doc.isToDate ? `${title}, ${words.toDate}` : title);
  status(ground);
  for (const paragraph of paragraphsOf(template.introduction)) pages.paragraph(paragraph);
  pages.heading(3, words.sections.stations);
  stationsTable(ground);
  pages.paragraph(`${BELOW_MINIMUM} ${words.belowMinimum}`, { size: SMALL, colour: SOFT_INK }, 2);
  if (shows(ground, 'complaints')) {
    pages.heading(3, words.sections.complaints, { keep: 20 });
    pages.paragraph(words.complaints(doc.complaints));
  }
  if (shows(ground, 'limits')) limitsTable(ground);
  if (shows(ground, 'compliance') && doc.limits.length > 0) {
    pages.heading(3, words.sections.compliance);
    complianceTable(ground, doc.stations);
  }
}

/** Text blocks of a template are parted by empty lines. */
export function paragraphsOf(block: string): string[] {
  return block
    .split(/\n\s*\n/)
    .map((paragraph) => paragraph.replaceAll(/\s+/g, ' ').trim())
    .filter((paragraph) => paragraph !== '');
}

/** A station’s figure by its name. */
export function figureOf(
  { figures }: DocumentStation,
  metric: SummaryMetric,
): { level: number | null; coverage: number; meetsMinimum: boolean } {
  const { day, evening, night, whole } = figures.periods;
  const covered = {
    Lday: day,
    Levening: evening ?? { coverage: 0, meetsMinimum: true },
    Lnight: night,
    Lden: whole,
  };
  const own = metric in covered ? covered[metric as keyof typeof covered] : figures;
  return { level: figures[metric], coverage: own.coverage, meetsMinimum: own.meetsMinimum };
}

function drawMark({ pages, context, doc }: PdfGround): void {
  const { mark } = context;
  if (!mark) return;
  const name = context.template.networkName ?? doc.network.name;
  pages.add(
    'Figure',
    () =>
      pages.doc.image(Buffer.from(mark.bytes), RIGHT - 130, 40, {
        fit: [130, MARK_HEIGHT],
        align: 'right',
      }),
    { alt: name, bbox: [RIGHT - 130, 40, RIGHT, 40 + MARK_HEIGHT] } as PDFKit.Mixins.StructureElementOptions,
  );
}

function status({ pages, words, format, doc, context }: PdfGround): void {
  const { revision, issuedBy } = context;
  if (revision === null) pages.paragraph(words.draft, { font: 'bold', colour: RUST }, 1);
  else pages.paragraph(words.revision(revision), { font: 'bold' }, 1);
  if (issuedBy) pages.paragraph(words.issued(issuedBy.name, format.instant(issuedBy.at)), {}, 1);
  pages.paragraph(words.computed(format.instant(doc.generatedAt)), { colour: SOFT_INK }, 1);
  if (doc.isToDate) pages.paragraph(words.notOver, { colour: RUST }, 1);
  pages.y += 6;
}

function stationsTable({ pages, words, format, doc, context }: PdfGround): void {
  const { metrics } = context.template;
  const columns: TableColumn[] = [
    { head: words.columns.station, align: 'left', width: 'wide' },
    ...metrics.map((head) => ({ head })),
    { head: words.columns.coverage },
    { head: words.columns.exceedances },
  ];
  const rows = doc.stations.map((station) => [
    `${station.code} ${station.name}`,
    ...metrics.map((metric) => {
      const { level, meetsMinimum } = figureOf(station, metric);
      return format.level(level, meetsMinimum);
    }),
    format.coverage(station.figures.coverage),
    station.exceedances.lifted === 0
      ? String(station.exceedances.standing)
      : `${station.exceedances.standing} (${words.lifted(station.exceedances.lifted)})`,
  ]);
  table(pages, columns, rows, { size: 8 });
}

function limitsTable(ground: PdfGround): void {
  const { pages, words, format, doc } = ground;
  pages.heading(3, words.sections.limits);
  if (doc.limits.length === 0) {
    pages.paragraph(words.none.limits);
    return;
  }
  const { columns } = words;
  table(
    pages,
    [
      { head: columns.limit, align: 'left', width: 'wide' },
      { head: columns.version },
      { head: columns.compared, align: 'left', width: 'wide' },
      { head: columns.level },
      { head: columns.inForce, align: 'left' },
    ],
    doc.limits.map((limit) => [
      limit.name,
      String(limit.version),
      words.limitText(limit.descriptor),
      format.value(limit.threshold, limit.unit),
      inForceText(ground, limit),
    ]),
  );
}

function inForceText({ words, format, doc }: PdfGround, limit: DocumentLimit): string {
  const from = limit.effectiveFrom <= doc.from ? null : format.shortInstant(limit.effectiveFrom);
  const ends = limit.effectiveTo !== null && limit.effectiveTo < doc.to;
  const to = ends ? format.shortInstant(limit.effectiveTo ?? '') : null;
  return from === null && to === null ? words.over.month : `${from ?? ''} – ${to ?? ''}`.trim();
}

/** How some stations stand to their limits. */
export function complianceTable(
  { pages, words, format }: PdfGround,
  stations: readonly DocumentStation[],
): void {
  const { columns } = words;
  table(
    pages,
    [
      { head: columns.station, align: 'left' },
      { head: columns.limit, align: 'left', width: 'wide' },
      { head: columns.windows },
      { head: columns.exceedances },
      { head: columns.highest },
      { head: columns.state, align: 'left' },
    ],
    stations.flatMap(({ code, compliance }) =>
      compliance.map((one) => [
        code,
        `${one.limit} (${format.value(one.threshold, one.unit)})`,
        one.windows === null ? '' : `${one.windows.compared} / ${one.windows.ended}`,
        String(one.standing),
        one.highest === null ? '' : format.value(one.highest, one.unit),
        {
          text: words.compliance[one.state],
          bold: one.state === 'exceeded',
          ...(one.state === 'exceeded' ? { colour: RUST } : {}),
        },
      ]),
    ),
    { size: 8 },
  );
}

/** Room to sign on. */
export function signatures({ pages, words }: PdfGround): void {
  pages.heading(3, words.sections['sign-off'], { keep: 110 });
  const { prepared, reviewed, issued } = words.signOff;
  const labels = [prepared, reviewed, issued];
  const gap = 24;
  const width = (RIGHT - LEFT - 2 * gap) / 3;
  const y = Math.min(pages.y + 46, PAGE.height - 90);
  labels.forEach((label, at) => {
    const x = LEFT + at * (width + gap);
    pages.rule(y, x, x + width, SOFT_INK);
    pages.add('P', () => pages.put(label, x, y + 3, { size: SMALL, colour: SOFT_INK }));
  });
  pages.y = y + 30;
}
