import { bandLabel } from '#lib/acoustics/bands';
import type { Content, TableCell } from 'pdfmake/interfaces';
import { parseInstant } from '#lib/contracts/common';
import type { Coverage, SummaryDay, SummaryExceedance, SummaryStation } from '#lib/contracts/summaries';
import { formatCoverage, formatLevelDb } from '#lib/format/levels';
import { limitValueText } from '#lib/format/limitMetric';
import { formatInstant, formatInstantShort, formatPeriod } from '#lib/format/times';
import { instrumentsWords } from '#lib/format/instruments';
import { placementsText } from '#lib/format/placements';
import { bandCoverageText, markedLevelText } from '../figures';
import { bandChartSvg } from './bandChart';
import { BOOK_TABLE, cell, head, heading, SMALL_SIZE, SOFT_INK, typeset } from './typography';

/** Exceedances that a station's list shows in print; the files carry them all. */
const MOST_PRINTED = 150;

/** A station's pages: its figures, the band chart, a line a day, a line a band, its exceedances. */
export function stationPages(station: SummaryStation, timeZone: string): Content[] {
  const chart = bandChartSvg(station.bands);
  return [
    {
      text: `${station.code}  ${station.name}`,
      bold: true,
      fontSize: 15,
      pageBreak: 'before',
      margin: [0, 0, 0, 2],
    },
    { text: descriptionOf(station, timeZone), color: SOFT_INK, margin: [0, 0, 0, 2] },
    {
      text: `Measured by: ${instrumentsWords(station.instruments, timeZone)}`,
      color: SOFT_INK,
      margin: [0, 0, 0, 2],
    },
    { text: weatherWords(station, timeZone), color: SOFT_INK, margin: [0, 0, 0, 8] },
    figuresTable(station, timeZone),
    ...(chart === null
      ? []
      : [
          heading('Bands over the month'),
          chartCaption(station),
          { svg: chart, margin: [0, 4, 0, 0] } as Content,
        ]),
    ...exceedanceList(station, timeZone),
    {
      columns: [
        {
          width: 292,
          stack: [
            heading('Day by day'),
            {
              text: 'A night goes by the date on which it begins.',
              color: SOFT_INK,
              fontSize: SMALL_SIZE,
              margin: [0, 0, 0, 4],
            },
            daysTable(station.days),
          ],
        },
        {
          width: '*',
          stack: [
            heading('Band by band'),
            {
              text: bandCoverageText(station.figures),
              color: SOFT_INK,
              fontSize: SMALL_SIZE,
              margin: [0, 0, 0, 4],
            },
            bandsTable(station),
          ],
        },
      ],
      columnGap: 26,
      pageBreak: 'before',
    },
  ];
}

function descriptionOf(
  { bandFraction, intervalSeconds, placements, mastHeightMetres, latitude, longitude }: SummaryStation,
  timeZone: string,
): string {
  const bands = bandFraction === 3 ? 'one-third-octave bands' : 'octave bands';
  const mast = mastHeightMetres === null ? '' : `, microphone at ${mastHeightMetres} m`;
  const where = `${latitude.toFixed(5)}, ${longitude.toFixed(5)}`;
  return `${placementsText(placements, timeZone)}${mast} · ${bands}, every ${intervalSeconds} s · ${where}`;
}

function figuresTable({ figures }: SummaryStation, timeZone: string): Content {
  const { periods } = figures;
  const row = (
    name: string,
    over: string,
    level: number | null,
    { coverage, meetsMinimum }: Coverage = figures,
  ): TableCell[] => [
    { ...typeset(name) },
    cell(over, 'left'),
    cell(markedLevelText(level, meetsMinimum)),
    cell(formatCoverage(coverage)),
  ];
  const samples =
    figures.sampleSeconds === null ? 'whole month' : `whole month, of LAeq,${figures.sampleSeconds} s`;
  const at =
    figures.LAFmaxAt === null
      ? 'whole month'
      : `in the interval from ${formatInstant(Date.parse(figures.LAFmaxAt) / 1000, timeZone)}`;
  return {
    layout: BOOK_TABLE,
    table: {
      headerRows: 1,
      widths: [70, '*', 70, 70],
      body: [
        [head('Figure', 'left'), head('Over', 'left'), head('Level, dB'), head('Coverage')],
        row('Lday', 'days', figures.Lday, periods.day),
        ...(periods.evening ? [row('Levening', 'evenings', figures.Levening, periods.evening)] : []),
        row('Lnight', 'nights', figures.Lnight, periods.night),
        row('Lden', 'pooled days, evenings and nights', figures.Lden, periods.whole),
        row('LAeq', 'whole month', figures.LAeq),
        row('LA10', samples, figures.LA10),
        row('LA50', samples, figures.LA50),
        row('LA90', samples, figures.LA90),
        row('LAFmax', at, figures.LAFmax),
      ],
    },
  };
}

function chartCaption({ figures }: SummaryStation): Content {
  return {
    ...typeset(
      `Unweighted levels: bar Leq, long tick L10, short tick L90. ${bandCoverageText(figures)}`,
      SMALL_SIZE,
    ),
    color: SOFT_INK,
  };
}

function daysTable(days: readonly SummaryDay[]): Content {
  const heads = ['Lday', 'Levening', 'Lnight', 'Lden', 'Coverage'];
  return {
    layout: BOOK_TABLE,
    fontSize: 8,
    table: {
      headerRows: 1,
      widths: ['*', ...heads.map(() => 'auto' as const)],
      body: [
        [head('Date', 'left'), ...heads.map((text) => head(text))],
        ...days.map((day) => [
          cell(day.date, 'left'),
          cell(markedLevelText(day.Lday, day.periods.day.meetsMinimum)),
          cell(markedLevelText(day.Levening, day.periods.evening?.meetsMinimum ?? true)),
          cell(markedLevelText(day.Lnight, day.periods.night.meetsMinimum)),
          cell(markedLevelText(day.Lden, day.periods.whole.meetsMinimum)),
          cell(formatCoverage(day.periods.whole.coverage)),
        ]),
      ],
    },
  };
}

function bandsTable({ bands }: SummaryStation): Content {
  return {
    layout: BOOK_TABLE,
    fontSize: 8,
    table: {
      headerRows: 1,
      widths: ['*', 'auto', 'auto', 'auto', 'auto'],
      body: [
        [head('Band', 'left'), ...['Leq', 'L10', 'L50', 'L90'].map((text) => head(text))],
        ...bands.map((band) => [
          cell(bandLabel(band), 'left'),
          cell(formatLevelDb(band.Leq)),
          cell(formatLevelDb(band.L10)),
          cell(formatLevelDb(band.L50)),
          cell(formatLevelDb(band.L90)),
        ]),
      ],
    },
  };
}

function exceedanceList({ exceedances: { items } }: SummaryStation, timeZone: string): Content[] {
  if (items.length === 0) {
    return [heading('Exceedances'), { text: 'None is on record for this month.' }];
  }
  const printed = items.slice(0, MOST_PRINTED);
  const more = items.length - printed.length;
  return [
    heading('Exceedances'),
    {
      layout: BOOK_TABLE,
      fontSize: 8,
      table: {
        headerRows: 1,
        widths: ['*', 'auto', 'auto', 'auto', 'auto', 'auto', 'auto'],
        body: [
          [
            head('Limit', 'left'),
            head('Metric', 'left'),
            head('From', 'left'),
            head('Level'),
            head('Limit'),
            head('Coverage'),
            head('State', 'left'),
          ],
          ...printed.map((item) => exceedanceRow(item, timeZone)),
        ],
      },
    },
    ...(more > 0
      ? [{ text: `and ${more} more, listed in the CSV and JSON files.`, margin: [0, 4, 0, 0] } as Content]
      : []),
  ];
}

function exceedanceRow(
  { limit, metric, from, level, threshold, unit, coverage, state }: SummaryExceedance,
  timeZone: string,
): TableCell[] {
  return [
    cell(limit, 'left'),
    { ...typeset(metric), alignment: 'left' },
    cell(formatInstantShort(Date.parse(from) / 1000, timeZone), 'left'),
    cell(limitValueText(level, unit)),
    cell(limitValueText(threshold, unit)),
    cell(formatCoverage(coverage)),
    cell(state, 'left'),
  ];
}

/** Who told the weather that decided which data count. */
function weatherWords({ masts }: SummaryStation, zone: string): string {
  if (masts.length === 0) return 'Wind and rain: by the station’s own sensor, where it has one.';
  const words = masts.map(({ code, name, from, to }) => {
    const span = { fromSec: parseInstant(from) ?? 0, toSec: parseInstant(to) ?? 0 };
    return `mast ${code} (${name}), ${formatPeriod(span, zone)}`;
  });
  return `Wind and rain: by the station’s own sensor, where it tells them; else by ${words.join('; ')}.`;
}
