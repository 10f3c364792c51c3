import { type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import { type DocumentBand } from '#lib/contracts/monthEvidence';
import { type DocumentDay, type DocumentHour } from '#lib/contracts/monthFigures';
import {
  count,
  date,
  hertz,
  instant,
  level,
  plainNumber,
  seconds,
  share,
  text,
  topicTable,
  truth,
  type Column,
  type TopicTable,
} from './table';

type Figures = DocumentStation['figures'];
type Of<Row> = { station: string; of: Row };

/** One figure of a station’s month with all that travels with it. */
interface MonthLevel {
  station: string;
  quantity: string;
  over: 'day' | 'evening' | 'night' | 'day-evening-night' | 'month';
  level: number | null;
  coverage: number;
  meetsMinimum: boolean;
  U: number | null;
  sampleSeconds: number | null;
  at: string | null;
}

const station = text<{ station: string }>('station', 'Code of the station', (row) => row.station);

/** Figures of the month, one a row. */
export function monthLevels({ stations }: MonthDocument): TopicTable {
  return topicTable<MonthLevel>(
    {
      name: 'month',
      title: 'Month',
      description:
        'Figures of the month, one a row. Lday, Levening, Lnight and Lden pool the periods that begin in the month; all others go by the clock.',
      key: ['station', 'quantity'],
    },
    [
      station,
      text('quantity', 'Name of the figure', (row) => row.quantity),
      text('over', 'Time that it is taken over', (row) => row.over),
      level('level_db', 'Level, dB', (row) => row.level),
      share('coverage', 'Valid time over the time elapsed', (row) => row.coverage),
      truth('meets_minimum', 'Whether the coverage reaches the network’s minimum', (row) => row.meetsMinimum),
      level('expanded_uncertainty_db', 'U = 2u, dB; empty where it is not told', (row) => row.U),
      seconds(
        'sample_seconds',
        'Length of the base samples of an exceedance level',
        (row) => row.sampleSeconds,
      ),
      instant('at', 'Beginning of the interval that has a maximum', (row) => row.at),
    ],
    stations.flatMap(({ code, figures }) => levelsOf(code, figures)),
  );
}

function levelsOf(code: string, figures: Figures): MonthLevel[] {
  const { periods, U } = figures;
  const plain = { station: code, U: null, sampleSeconds: null, at: null };
  const clock = { ...plain, over: 'month' as const, ...covered(figures) };
  const { day, evening, night, whole } = periods;
  return [
    { ...plain, quantity: 'Lday', over: 'day', level: figures.Lday, ...covered(day), U: U.Lday },
    ...(evening
      ? [
          {
            ...plain,
            quantity: 'Levening',
            over: 'evening' as const,
            level: figures.Levening,
            ...covered(evening),
            U: U.Levening,
          },
        ]
      : []),
    { ...plain, quantity: 'Lnight', over: 'night', level: figures.Lnight, ...covered(night), U: U.Lnight },
    {
      ...plain,
      quantity: 'Lden',
      over: 'day-evening-night',
      level: figures.Lden,
      ...covered(whole),
      U: U.Lden,
    },
    { ...clock, quantity: 'LAeq', level: figures.LAeq, U: U.LAeq },
    { ...clock, quantity: 'LAeq incident', level: figures.incident },
    { ...clock, quantity: 'LCeq', level: figures.LCeq },
    { ...clock, quantity: 'LAFmax', level: figures.LAFmax, at: figures.LAFmaxAt },
    { ...clock, quantity: 'LAFmin', level: figures.LAFmin },
    { ...clock, quantity: 'LCpeak', level: figures.LCpeak },
    ...(['LA1', 'LA5', 'LA10', 'LA50', 'LA90', 'LA95', 'LA99'] as const).map((quantity) => ({
      ...clock,
      quantity,
      level: figures[quantity],
      sampleSeconds: figures.sampleSeconds,
    })),
  ];
}

function covered({ coverage, meetsMinimum }: { coverage: number; meetsMinimum: boolean }) {
  return { coverage, meetsMinimum };
}

const UNCERTAIN = ['Lday', 'Levening', 'Lnight', 'Lden', 'LAeq'] as const;
const POOLED = ['Lday', 'Levening', 'Lnight', 'Lden', 'LAeq', 'LA10', 'LA50', 'LA90', 'LAFmax'] as const;

/** The year so far, a station a row. */
export function yearToDateTable({ stations }: MonthDocument): TopicTable {
  return topicTable<Of<DocumentStation['yearToDate']>>(
    {
      name: 'year_to_date',
      title: 'Year to date',
      description: 'From the first of January to the end of the month: all energies pooled.',
      key: ['station'],
    },
    [
      station,
      instant('from', 'Beginning', ({ of }) => of.from),
      instant('to', 'End', ({ of }) => of.to),
      ...POOLED.map((name) =>
        level<Of<DocumentStation['yearToDate']>>(`${name}_db`, `${name}, dB`, ({ of }) => of[name]),
      ),
      ...UNCERTAIN.map((name) =>
        level<Of<DocumentStation['yearToDate']>>(
          `${name}_U_db`,
          `Expanded uncertainty of ${name}, dB; empty where it is not told`,
          ({ of }) => of.U?.[name],
        ),
      ),
      ...coverageColumns<DocumentStation['yearToDate']>(),
      seconds('sample_seconds', 'Length of the base samples of LA10 to LA90', ({ of }) => of.sampleSeconds),
    ],
    stations.map(({ code, yearToDate }) => ({ station: code, of: yearToDate })),
  );
}

/** Dates of the month. */
export function daysTable({ stations }: MonthDocument): TopicTable {
  type Row = Of<DocumentDay>;
  const period = (
    name: 'Lday' | 'Levening' | 'Lnight' | 'Lden',
    kind: 'day' | 'evening' | 'night' | 'whole',
  ): Column<Row>[] => [
    level(`${name}_db`, `${name}, dB`, ({ of }) => of[name]),
    share(`${name}_coverage`, `Coverage of ${name}`, ({ of }) => of.periods[kind]?.coverage),
    truth(
      `${name}_meets_minimum`,
      `Whether the coverage of ${name} reaches the minimum`,
      ({ of }) => of.periods[kind]?.meetsMinimum,
    ),
    level(`${name}_U_db`, `Expanded uncertainty of ${name}, dB`, ({ of }) => of.U[name]),
  ];
  return topicTable<Row>(
    {
      name: 'days',
      title: 'Days',
      description:
        'Local dates. The night is the one that begins on the date; LAeq24h, LAFmax and the exceedance levels are of the civil day.',
      key: ['station', 'date'],
    },
    [
      station,
      date('date', 'Local date', ({ of }) => of.date),
      plainNumber('hours', 'Length of the civil day in hours', ({ of }) => of.hours),
      ...period('Lday', 'day'),
      ...period('Levening', 'evening'),
      ...period('Lnight', 'night'),
      ...period('Lden', 'whole'),
      level('LAeq24h_db', 'LAeq of the civil day, dB', ({ of }) => of.LAeq24h),
      level('LAeq24h_U_db', 'Expanded uncertainty of LAeq24h, dB', ({ of }) => of.U.LAeq),
      level('LAFmax_db', 'Highest LAFmax, dB', ({ of }) => of.LAFmax),
      level('LA10_db', 'LA10, dB', ({ of }) => of.LA10),
      level('LA50_db', 'LA50, dB', ({ of }) => of.LA50),
      level('LA90_db', 'LA90, dB', ({ of }) => of.LA90),
      ...coverageColumns<DocumentDay>(),
      seconds('sample_seconds', 'Length of the base samples', ({ of }) => of.sampleSeconds),
    ],
    stations.flatMap(({ code, days }) => days.map((of) => ({ station: code, of }))),
  );
}

/** Hours of the clock on the wall. */
export function hoursTable({ stations }: MonthDocument): TopicTable {
  return topicTable<Of<DocumentHour>>(
    {
      name: 'hours',
      title: 'Hours',
      description: 'LAeq of each hour of the clock on the wall.',
      key: ['station', 'date', 'hour', 'turn'],
    },
    [
      station,
      date('date', 'Local date', ({ of }) => of.date),
      count('hour', 'Hour of the clock, 0 to 23', ({ of }) => of.hour),
      count('turn', '1: the second hour of that name, in autumn', ({ of }) => of.turn),
      level('LAeq_db', 'LAeq, dB', ({ of }) => of.LAeq),
      share('coverage', 'Valid time over the time elapsed', ({ of }) => of.coverage),
      truth('meets_minimum', 'Whether the coverage reaches the minimum', ({ of }) => of.meetsMinimum),
    ],
    stations.flatMap(({ code, hours }) => hours.map((of) => ({ station: code, of }))),
  );
}

/** Bands and octaves of the month. */
export function bandsTable({ stations }: MonthDocument): TopicTable {
  type Row = Of<DocumentBand> & { fraction: string };
  const fractionOf = ({ bandFraction }: DocumentStation) => (bandFraction === 3 ? 'third' : 'octave');
  return topicTable<Row>(
    {
      name: 'bands',
      title: 'Bands',
      description: 'Unweighted levels of the station’s bands and of octaves over the month, by the clock.',
      key: ['station', 'fraction', 'nominal_hz'],
    },
    [
      station,
      text('fraction', 'third or octave', (row) => row.fraction),
      hertz('nominal_hz', 'Nominal mid-band frequency', ({ of }) => of.nominalHz),
      level('Leq_db', 'Leq, dB', ({ of }) => of.Leq),
      level('L10_db', 'L10 of the band’s own samples, dB', ({ of }) => of.L10),
      level('L50_db', 'L50 of the band’s own samples, dB', ({ of }) => of.L50),
      level('L90_db', 'L90 of the band’s own samples, dB', ({ of }) => of.L90),
      share('coverage', 'Time with a level over the time elapsed', ({ of }) => of.coverage),
    ],
    stations.flatMap((one) => [
      ...one.bands.map((of) => ({ station: one.code, fraction: fractionOf(one), of })),
      ...(one.bandFraction === 3
        ? one.octaves.map((of) => ({ station: one.code, fraction: 'octave', of }))
        : []),
    ]),
  );
}

type Covered = {
  seconds: { expected: number; valid: number; excluded: number };
  coverage: number;
  meetsMinimum: boolean;
};

function coverageColumns<Row extends Covered>(): Column<Of<Row>>[] {
  return [
    seconds('expected_seconds', 'Seconds elapsed', ({ of }) => of.seconds.expected),
    seconds('valid_seconds', 'Of them with valid data', ({ of }) => of.seconds.valid),
    seconds('excluded_seconds', 'Of them measured and left out', ({ of }) => of.seconds.excluded),
    share('coverage', 'Valid seconds over those elapsed', ({ of }) => of.coverage),
    truth('meets_minimum', 'Whether the coverage reaches the minimum', ({ of }) => of.meetsMinimum),
  ];
}
