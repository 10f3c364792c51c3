import { bandLabel } from '#lib/acoustics/bands';
import { type BandHours, type BandRow, type FigureSheet, type PooledRow } from '#lib/contracts/figureSheet';
import { csvText, type Cell } from '#lib/format/csvText';

const HEADER = ['section', 'of', 'figure', 'value', 'unit', 'coverage', 'remark'] as const;

/** Everything on the page as one long table, unrounded: a line a figure. */
export function sheetCsv(sheet: FigureSheet): string {
  return csvText([
    HEADER,
    ...sheet.head.map(({ name, words }): Cell[] => ['head', '', name, words, '', null, '']),
    ...[...sheet.levels, ...sheet.assessments].map((row): Cell[] => [
      'period',
      '',
      row.key,
      row.value,
      row.unit,
      row.coverage,
      row.missing ?? row.note ?? '',
    ]),
    ...(sheet.comparison?.figures ?? []).flatMap(({ key, unit, validDb, rawDb, differenceDb }): Cell[][] => [
      ['comparison', 'valid', key, validDb, unit, sheet.coverage, ''],
      ['comparison', 'raw', key, rawDb, unit, null, ''],
      ['comparison', 'valid minus raw', key, differenceDb, unit, null, ''],
    ]),
    ...(sheet.intervals?.reasons ?? []).map(({ reason, sec }): Cell[] => [
      'left out',
      reason,
      'time',
      sec,
      's',
      null,
      '',
    ]),
    ...dateLines(sheet),
    ...periodLines('by the clock', sheet.byClock),
    ...(sheet.byDate ? periodLines('by the date they begin on', sheet.byDate) : []),
    ...sheet.bands.flatMap((row) => bandLines(sheet.bandFraction === 3 ? 'bands' : 'octave bands', row)),
    ...(sheet.bandFraction === 3 ? sheet.octaves.flatMap((row) => bandLines('octaves', row)) : []),
    ...(sheet.distribution?.classes ?? []).map(({ fromDb, share }): Cell[] => [
      'distribution',
      `${fromDb} to below ${fromDb + 1} dB`,
      'share of valid time',
      share,
      '',
      null,
      '',
    ]),
    ...sheet.heatMap.flatMap(({ cells }) =>
      cells.map(({ from, LAeq, coverage }): Cell[] => ['hours', from, 'LAeq', LAeq, 'dB', coverage, '']),
    ),
    ...bandHourLines(sheet.bandHours),
    ...sheet.byHour.flatMap((row) => pooledLines('hour of the day', row)),
    ...sheet.byWeekday.flatMap((row) => pooledLines('weekday', row)),
    ...sheet.cautions.map((caution): Cell[] => ['caution', '', '', '', '', null, caution]),
  ]);
}

function dateLines({ dates, hasCnel }: FigureSheet): Cell[][] {
  return dates.flatMap((row): Cell[][] => {
    const { day, evening, night } = row.periods;
    const line = (figure: string, value: number | null, coverage: number | null): Cell[] => [
      'dates',
      row.date,
      figure,
      value,
      'dB',
      coverage,
      '',
    ];
    return [
      line('Lday', row.Lday, day.coverage),
      ...(evening ? [line('Levening', row.Levening, evening.coverage)] : []),
      line('Lnight', row.Lnight, night.coverage),
      line('Lden', row.Lden, null),
      line('Ldn', row.Ldn, row.coverage),
      ...(hasCnel ? [line('CNEL', row.CNEL, row.coverage)] : []),
      line('LA10,18 h', row.L10of18h, null),
      line('LAeq,24 h', row.LAeq24h, row.coverage),
    ];
  });
}

function periodLines(of: string, { rows, Lden, missing }: FigureSheet['byClock']): Cell[][] {
  return [
    ...rows.flatMap((row) => pooledLines(`periods ${of}`, row)),
    [`periods ${of}`, 'all', 'Lden', Lden, 'dB', null, missing ?? ''],
  ];
}

function pooledLines(section: string, row: PooledRow): Cell[][] {
  const names = ['LAeq', 'LA10', 'LA50', 'LA90', 'LAFmax'] as const;
  return names.map((name) => [section, row.label, name, row[name], 'dB', row.coverage, '']);
}

function bandHourLines({ bandFraction, bandsHz, octavesHz, hours }: BandHours): Cell[][] {
  const line = (
    section: string,
    hour: BandHours['hours'][number],
    hz: number | undefined,
    levelDb: number | null,
  ) => [
    section,
    `${String(hour.hour).padStart(2, '0')}–${String(hour.hour + 1).padStart(2, '0')}`,
    `Leq ${bandLabel({ nominalHz: hz ?? NaN })}`,
    levelDb,
    'dB',
    hour.coverage,
    '',
  ];
  return hours.flatMap((hour) => [
    ...(bandFraction === 3
      ? hour.bandsLeq.map((levelDb, at) => line('bands by hour of the day', hour, bandsHz[at], levelDb))
      : []),
    ...hour.octavesLeq.map((levelDb, at) => line('octaves by hour of the day', hour, octavesHz[at], levelDb)),
  ]);
}

function bandLines(section: string, row: BandRow): Cell[][] {
  const names = ['Leq', 'L10', 'L50', 'L90', 'highest', 'aLeq'] as const;
  return names.map((name) => [
    section,
    row.label,
    name === 'aLeq' ? 'A-weighted Leq' : name === 'highest' ? 'highest interval' : name,
    row[name],
    'dB',
    row.coverage,
    '',
  ]);
}
