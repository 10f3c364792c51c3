import { roundHalfUp } from '#lib/acoustics/rounding';
import type {
  Coverage,
  Summary,
  SummaryDay,
  SummaryExceedance,
  SummaryStation,
} from '#lib/contracts/summaries';
import { csvText, type Cell } from '#lib/format/csvText';

/** Columns of the long form: one figure a row. A column that a kind of record does not have is empty there. */
export const CSV_COLUMNS = [
  'record',
  'network',
  'month',
  'station',
  'date',
  'from',
  'to',
  'period',
  'band_hz',
  'quantity',
  'value',
  'unit',
  'coverage',
  'meets_minimum',
  'sample_seconds',
  'limit',
  'threshold',
  'state',
  'complete',
] as const;
type Column = (typeof CSV_COLUMNS)[number];
type Row = Partial<Record<Column, Cell>> & {
  record: 'month' | 'day' | 'band' | 'exceedance';
  quantity: string;
};

/** Decimals of levels and coverage in the file: fine enough that rounding them again gives what the page and the PDF show. */
const DECIMALS = 4;

/**
 * The month as CSV in one tidy long form. The first column says the kind of record: `month`, `day`, `band` or `exceedance`.
 * Times are UTC; dates are local. Levels are those of the JSON to four decimals.
 */
export function summaryCsv(summary: Summary): string {
  const rows = [...countRows(summary), ...summary.stations.flatMap(stationRows)];
  const shared = { network: summary.network.slug, month: summary.month, complete: !summary.isToDate };
  const cells = rows.map((row) => CSV_COLUMNS.map((column) => ({ ...row, ...shared })[column] ?? null));
  return csvText([[...CSV_COLUMNS], ...cells]);
}

function countRows({ complaints }: Summary): Row[] {
  return Object.entries(complaints).map(([status, count]) => ({
    record: 'month',
    quantity: 'complaints',
    value: count,
    unit: 'count',
    state: status,
  }));
}

function stationRows(station: SummaryStation): Row[] {
  const rows = [
    ...monthRows(station),
    ...station.bands.flatMap((band) =>
      (['Leq', 'L10', 'L50', 'L90'] as const).map((quantity): Row => ({
        record: 'band',
        band_hz: band.nominalHz,
        ...levelCells(quantity, band[quantity]),
        ...coverageCells(station.figures),
      })),
    ),
    ...station.days.flatMap(dayRows),
    ...station.exceedances.items.map(exceedanceRow),
  ];
  return rows.map((row) => ({ ...row, station: station.code }));
}

function monthRows({ figures, exceedances }: SummaryStation): Row[] {
  const whole = coverageCells(figures);
  const samples = { sample_seconds: figures.sampleSeconds };
  return [
    ...periodRows('month', figures),
    { record: 'month', ...levelCells('LAeq', figures.LAeq), ...whole },
    ...(['LA10', 'LA50', 'LA90'] as const).map((quantity): Row => ({
      record: 'month',
      ...levelCells(quantity, figures[quantity]),
      ...whole,
      ...samples,
    })),
    { record: 'month', ...levelCells('LAFmax', figures.LAFmax), ...whole, from: figures.LAFmaxAt },
    ...(['standing', 'lifted'] as const).map((state): Row => ({
      record: 'month',
      quantity: 'exceedances',
      value: exceedances[state],
      unit: 'count',
      state,
    })),
  ];
}

function dayRows(day: SummaryDay): Row[] {
  return periodRows('day', day).map((row) => ({ ...row, date: day.date }));
}

type PeriodFigures = Pick<SummaryDay, 'Lday' | 'Levening' | 'Lnight' | 'Lden' | 'periods'>;

function periodRows(record: 'month' | 'day', figures: PeriodFigures): Row[] {
  const { day, evening, night, whole } = figures.periods;
  return [
    { record, period: 'day', ...levelCells('Lday', figures.Lday), ...coverageCells(day) },
    ...(evening
      ? [
          {
            record,
            period: 'evening',
            ...levelCells('Levening', figures.Levening),
            ...coverageCells(evening),
          },
        ]
      : []),
    { record, period: 'night', ...levelCells('Lnight', figures.Lnight), ...coverageCells(night) },
    { record, ...levelCells('Lden', figures.Lden), ...coverageCells(whole) },
  ];
}

function exceedanceRow(exceedance: SummaryExceedance): Row {
  const { limit, metric, from, to, level, threshold, unit, coverage, state } = exceedance;
  return {
    record: 'exceedance',
    from,
    to,
    ...levelCells(metric, level),
    unit,
    coverage: rounded(coverage),
    limit,
    threshold,
    state,
  };
}

function levelCells(quantity: string, value: number | null): { quantity: string; value: Cell; unit: string } {
  return { quantity, value: value === null ? null : rounded(value), unit: 'dB' };
}

function coverageCells({ coverage, meetsMinimum }: Coverage): { coverage: Cell; meets_minimum: Cell } {
  return { coverage: rounded(coverage), meets_minimum: meetsMinimum };
}

function rounded(value: number): number {
  return roundHalfUp(value, DECIMALS);
}
