import { type DocumentStation } from '#lib/contracts/monthDocument';
import { bandLabel } from '#lib/acoustics/bands';
import { SMALL, SOFT_INK } from './fonts';
import { bandChart, figure, heatMap, rampLegend, trendChart } from './charts';
import { shows, type PdfGround } from './ground';
import { complianceTable, figureOf } from './overview';
import { LEFT, WIDTH } from './pages';
import { spectrogramPng } from './spectrogramPng';
import { exceedances, stationEvidence } from './stationEvidence';
import { table } from './table';

const CAPTION = { size: SMALL + 0.5, colour: SOFT_INK };
const PICTURE_HEIGHT = 190;
/** Height of a line of a table of bands, points. */
const BAND_ROW = 11.4;

/** A station’s pages: what it is, its figures, its days and hours, its bands, and what stands behind them. */
export function stationPages(ground: PdfGround, station: DocumentStation): void {
  const { pages, words } = ground;
  pages.section(`${station.code} ${station.name}`);
  pages.heading(2, `${station.code}  ${station.name}`);
  description(ground, station);
  pages.y += 4;
  if (station.figures.LAeq === null) pages.paragraph(words.noData, { font: 'bold' });
  else measured(ground, station);
  if (shows(ground, 'compliance') && station.compliance.length > 0) {
    pages.heading(3, words.sections.compliance);
    complianceTable(ground, [station]);
  }
  if (shows(ground, 'exceedances')) exceedances(ground, station);
  if (station.figures.LAeq !== null) pictures(ground, station);
  stationEvidence(ground, station);
}

function measured(ground: PdfGround, station: DocumentStation): void {
  const { pages, words, format } = ground;
  figuresTable(ground, station);
  const terms = words.uncertainty(station.figures.uncertainty, (db) => format.number(db, 2));
  pages.paragraph(terms, CAPTION);
}

/** Days, hours and bands, which need some measured level. */
function pictures(ground: PdfGround, station: DocumentStation): void {
  const { pages, words, doc } = ground;
  if (shows(ground, 'days')) days(ground, station);
  if (shows(ground, 'heat-map')) {
    pages.heading(3, words.sections['heat-map'], { keep: 330 });
    pages.paragraph(words.captions.heatMap, CAPTION, 2);
    heatMap(ground, doc, station);
  }
  if (shows(ground, 'spectrogram')) spectrogram(ground, station);
  bands(ground, station);
}

function description({ pages, words, format }: PdfGround, station: DocumentStation): void {
  const { placements, mastHeightMetres, bandFraction, intervalSeconds, latitude, longitude } = station;
  const stood = placements.map(({ placement, correction }) =>
    correction === 0
      ? words.placements[placement]
      : `${words.placements[placement]} (${words.correction(format.difference(correction))})`,
  );
  const facts = [
    [...new Set(stood)].join('; '),
    ...(mastHeightMetres === null ? [] : [words.microphone(mastHeightMetres)]),
    words.bandsAre(bandFraction, intervalSeconds),
    `${latitude.toFixed(5)}, ${longitude.toFixed(5)}`,
  ];
  pages.paragraph(facts.join(' · '), { colour: SOFT_INK }, 1.5);
  const instruments = station.instruments.map(
    ({ serialNumber, description: name, class: ofClass }) =>
      `${name} ${serialNumber} (IEC 61672-1, ${words.language === 'de' ? 'Klasse' : 'class'} ${ofClass})`,
  );
  pages.labelled(words.measuredBy, instruments.length === 0 ? words.noInstrument : instruments.join('; '));
}

function figuresTable(ground: PdfGround, station: DocumentStation): void {
  const { pages, words, format, context } = ground;
  const { figures, yearToDate } = station;
  const showsYear = shows(ground, 'year-to-date');
  const sampled = figures.sampleSeconds === null ? words.over.month : words.ofSamples(figures.sampleSeconds);
  const over = {
    Lday: words.over.days,
    Levening: words.over.evenings,
    Lnight: words.over.nights,
    Lden: words.over.pooled,
    LAeq: words.over.month,
    LA10: sampled,
    LA50: sampled,
    LA90: sampled,
    LAFmax:
      figures.LAFmaxAt === null ? words.over.month : words.maximumAt(format.shortInstant(figures.LAFmaxAt)),
  };
  const uncertain = figures.U;
  const { columns } = words;
  table(
    pages,
    [
      { head: columns.figure, align: 'left', width: 62 },
      { head: columns.over, align: 'left', width: 'wide' },
      { head: columns.level },
      { head: 'U, dB' },
      { head: columns.coverage },
      ...(showsYear ? [{ head: words.sections['year-to-date'] }, { head: 'U, dB' }] : []),
    ],
    context.template.metrics
      .filter((metric) => metric !== 'Levening' || figures.periods.evening !== null)
      .map((metric) => {
        const { level, coverage, meetsMinimum } = figureOf(station, metric);
        const of = metric in uncertain ? (metric as keyof typeof uncertain) : null;
        return [
          metric,
          over[metric],
          format.level(level, meetsMinimum),
          format.uncertainty(of && uncertain[of]),
          format.coverage(coverage),
          ...(showsYear
            ? [
                format.level(yearToDate[metric], yearToDate.meetsMinimum),
                format.uncertainty((of && yearToDate.U?.[of]) ?? null),
              ]
            : []),
        ];
      }),
  );
  if (showsYear) {
    const caption = words.captions.yearToDate(format.date(yearToDate.from), format.date(ground.doc.to));
    pages.paragraph(
      `${words.sections['year-to-date']}: ${caption} ${columns.coverage} ${format.coverage(yearToDate.coverage)}.`,
      CAPTION,
      2,
    );
  }
}

function days(ground: PdfGround, station: DocumentStation): void {
  const { pages, words, format, context } = ground;
  pages.heading(3, words.sections.days, { keep: 160 + (station.days.length + 2) * BAND_ROW });
  pages.paragraph(words.captions.days, CAPTION, 3);
  const { metrics } = context.template;
  trendChart(ground, station, metrics);
  table(
    pages,
    [
      { head: words.columns.date, align: 'left' },
      ...metrics.map((head) => ({ head: head === 'LAeq' ? 'LAeq24h' : head })),
      { head: 'U(Lden)' },
      { head: words.columns.coverage },
    ],
    station.days.map((day) => {
      const { periods } = day;
      const cells = {
        Lday: format.level(day.Lday, periods.day.meetsMinimum),
        Levening: format.level(day.Levening, periods.evening?.meetsMinimum ?? true),
        Lnight: format.level(day.Lnight, periods.night.meetsMinimum),
        Lden: format.level(day.Lden, periods.whole.meetsMinimum),
        LAeq: format.level(day.LAeq24h, day.meetsMinimum),
        LA10: format.level(day.LA10, day.meetsMinimum),
        LA50: format.level(day.LA50, day.meetsMinimum),
        LA90: format.level(day.LA90, day.meetsMinimum),
        LAFmax: format.level(day.LAFmax),
      };
      return [
        day.date,
        ...metrics.map((metric) => cells[metric]),
        format.uncertainty(day.U.Lden),
        format.coverage(day.coverage),
      ];
    }),
    { size: 8 },
  );
}

/** The chart of the bands, and under it the bands’ figures with those of octaves beside them. */
function bands(ground: PdfGround, station: DocumentStation): void {
  const { pages, words } = ground;
  const own = shows(ground, 'bands') ? station.bands.filter(({ Leq }) => Leq !== null) : [];
  const octaves =
    shows(ground, 'octaves') && station.bandFraction === 3
      ? station.octaves.filter(({ Leq }) => Leq !== null)
      : [];
  if (own.length > 0) {
    pages.heading(3, words.sections.bands, { keep: 180 + (own.length + 2) * BAND_ROW });
    bandChart(ground, station);
  }
  const top = pages.y;
  if (own.length > 0) bandTable(ground, own, { head: words.columns.band, left: LEFT, width: 276, size: 8 });
  const below = pages.y;
  if (octaves.length === 0) return;
  const isBeside = own.length > octaves.length && below > top;
  if (isBeside) pages.y = top;
  else pages.heading(3, words.sections.octaves);
  const left = isBeside ? LEFT + 306 : LEFT;
  bandTable(ground, octaves, { head: words.sections.octaves, left, width: WIDTH - 306, size: 8 });
  pages.y = Math.max(pages.y, isBeside ? below : 0);
}

function bandTable(
  { pages, words, format }: PdfGround,
  rows: DocumentStation['bands'],
  { head, ...options }: { head: string; left: number; width: number; size: number },
): void {
  const names = ['Leq', 'L10', 'L50', 'L90'] as const;
  const columns = [...names.map((name) => ({ head: name })), { head: words.columns.coverage }];
  const cells = rows.map((band) => [
    bandLabel(band),
    ...names.map((name) => format.level(band[name])),
    format.coverage(band.coverage),
  ]);
  table(pages, [{ head, align: 'left' }, ...columns], cells, options);
}

function spectrogram({ pages, words, format }: PdfGround, station: DocumentStation): void {
  const picture = station.spectrogram && spectrogramPng(station.spectrogram);
  if (!station.spectrogram || !picture) return;
  const { bandsHz } = station.spectrogram;
  pages.heading(3, words.sections.spectrogram, { keep: PICTURE_HEIGHT + 40 });
  pages.paragraph(words.captions.spectrogram, CAPTION, 2);
  const left = LEFT + 36;
  const width = WIDTH - 36 - 62;
  figure(pages, PICTURE_HEIGHT + 24, words.alternatives.spectrogram(station.code), (top) => {
    pages.doc.image(picture.png, left, top, { width, height: PICTURE_HEIGHT });
    const row = PICTURE_HEIGHT / bandsHz.length;
    bandsHz.forEach((nominalHz, at) => {
      if (bandsHz.length > 12 && at % 3 !== 0) return;
      const y = top + PICTURE_HEIGHT - (at + 0.5) * row - 5;
      pages.put(bandLabel({ nominalHz }), left - 4, y, { size: SMALL, colour: SOFT_INK, align: 'right' });
    });
    const dates = station.days.map(({ date }) => Number(date.slice(8)));
    const last = Math.max(...dates, 1);
    for (let day = 1; day <= last; day += 5) {
      const x = left + ((day - 1) / last) * width;
      pages.put(String(day), x, top + PICTURE_HEIGHT + 2, { size: SMALL, colour: SOFT_INK });
    }
    pages.put(words.axes.date, left, top + PICTURE_HEIGHT + 11, { size: SMALL, colour: SOFT_INK });
    rampLegend(pages, picture, format, { x: LEFT + WIDTH - 52, top, height: PICTURE_HEIGHT });
  });
}
