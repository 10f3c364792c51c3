import { type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import { type DocumentCalibration, type WindSource } from '#lib/contracts/monthEvidence';
import { type PeriodInstrument } from '#lib/contracts/periodInstruments';
import {
  count,
  degrees,
  hertz,
  instant,
  level,
  metres,
  plainNumber,
  seconds,
  share,
  speed,
  text,
  topicTable,
  truth,
  type TopicTable,
} from './table';

type Of<Row> = { station: string; of: Row };
const station = text<{ station: string }>('station', 'Code of the station', (row) => row.station);

function each<Row>(
  { stations }: MonthDocument,
  rows: (station: DocumentStation) => readonly Row[],
): Of<Row>[] {
  return stations.flatMap((one) => rows(one).map((of) => ({ station: one.code, of })));
}

/** The stations and what their uncertainties rest on. */
export function stationsTable(doc: MonthDocument): TopicTable {
  return topicTable<DocumentStation>(
    {
      name: 'stations',
      title: 'Stations',
      description: 'Stations that stood in the month, and what the uncertainty of their figures rests on.',
      key: ['station'],
    },
    [
      text('station', 'Code', ({ code }) => code),
      text('name', 'Name', ({ name }) => name),
      plainNumber('latitude', 'Degrees north, WGS 84', ({ latitude }) => latitude),
      plainNumber('longitude', 'Degrees east, WGS 84', ({ longitude }) => longitude),
      text('placement', 'free-field or facade, as it is now', ({ placement }) => placement),
      metres('microphone_height_m', 'Height above ground', ({ mastHeightMetres }) => mastHeightMetres),
      count('bands_an_octave', '3: thirds; 1: octaves', ({ bandFraction }) => bandFraction),
      seconds('interval_seconds', 'Registered length of intervals', ({ intervalSeconds }) => intervalSeconds),
      instant('stands_from', 'Registered', ({ standsFrom }) => standsFrom),
      instant('stands_to', 'Retired', ({ standsTo }) => standsTo),
      seconds('expected_seconds', 'Of the month elapsed', ({ figures }) => figures.seconds.expected),
      seconds('valid_seconds', 'Of them with valid data', ({ figures }) => figures.seconds.valid),
      seconds('excluded_seconds', 'Of them measured and left out', ({ figures }) => figures.seconds.excluded),
      share(
        'coverage_since_registration',
        'Coverage of the month since the registration',
        (one) => one.coverageSinceRegistration,
      ),
      level(
        'u_instrument_db',
        'Standard uncertainty of the instrument’s class',
        ({ figures }) => figures.uncertainty.instrument,
      ),
      text('u_instrument_basis', 'What that rests on', ({ figures }) => figures.uncertainty.basis),
      level('u_drift_db', 'Largest drift by the checks', ({ figures }) => figures.uncertainty.drift),
      text(
        'u_drift_known',
        'Sides on which checks enclose the month',
        ({ figures }) => figures.uncertainty.driftKnown,
      ),
      level('u_gaps_db', 'Of gaps, into LAeq of the month', ({ figures }) => figures.uncertainty.gaps),
    ],
    doc.stations,
  );
}

/** Tones and low frequencies of the month, a station a row. */
export function screeningTable(doc: MonthDocument): TopicTable {
  return topicTable<DocumentStation>(
    {
      name: 'tonality',
      title: 'Tonality',
      description: 'Tones by the survey method and low-frequency screening, by quarter-hours.',
      key: ['station'],
    },
    [
      text('station', 'Code of the station', ({ code }) => code),
      text(
        'not_assessable',
        'Why the mean spectrum says nothing about tones',
        ({ tonality }) => tonality.notAssessable,
      ),
      count('quarters_assessed', 'Quarter-hours looked at', ({ tonality }) => tonality.assessedBlocks),
      count('quarters_tonal', 'Of them with a tone', ({ tonality }) => tonality.tonalBlocks),
      level('LCeq_less_LAeq_db', 'Of the month', ({ lowFrequency }) => lowFrequency.difference),
      level('bound_db', 'Above it low frequencies deserve a look', ({ lowFrequency }) => lowFrequency.bound),
      truth('is_above_bound', 'Whether the month is above it', ({ lowFrequency }) => lowFrequency.isAbove),
      count(
        'quarters_with_LCeq',
        'Quarter-hours that have both levels',
        ({ lowFrequency }) => lowFrequency.assessedBlocks,
      ),
      count(
        'quarters_above_bound',
        'Of them above the bound',
        ({ lowFrequency }) => lowFrequency.blocksAbove,
      ),
    ],
    doc.stations,
  );
}

/** Tones of the mean spectrum, and bands that had a tone in some quarter-hour. */
export function tonesTable(doc: MonthDocument): TopicTable {
  type Row = {
    of: string;
    method: string;
    lowHz: number;
    highHz: number;
    excess: number | null;
    threshold: number | null;
    blocks: number | null;
  };
  return topicTable<Of<Row>>(
    {
      name: 'tones',
      title: 'Tones',
      description:
        'Bands that stand out: of the month’s mean spectrum, and how often of single quarter-hours.',
      key: ['station', 'of', 'method', 'low_hz', 'high_hz'],
    },
    [
      station,
      text('of', 'mean-spectrum or quarter-hours', ({ of }) => of.of),
      text(
        'method',
        'survey (ISO 1996-2:2017 Annex K) or adjacent-pair (Bittern’s own)',
        ({ of }) => of.method,
      ),
      hertz(
        'low_hz',
        'Of the mean spectrum the lower edge; of quarter-hours the nominal band',
        ({ of }) => of.lowHz,
      ),
      hertz(
        'high_hz',
        'Of the mean spectrum the upper edge; of quarter-hours the nominal band',
        ({ of }) => of.highHz,
      ),
      level('excess_db', 'Above the louder neighbour', ({ of }) => of.excess),
      level('threshold_db', 'What it had to reach', ({ of }) => of.threshold),
      count('quarters', 'Quarter-hours with a tone in the band', ({ of }) => of.blocks),
    ],
    each(doc, ({ tonality }) => [
      ...tonality.tones.map(({ method, lowerHz, upperHz, excess, threshold }) => ({
        of: 'mean-spectrum',
        method: method as string,
        lowHz: lowerHz,
        highHz: upperHz,
        excess,
        threshold,
        blocks: null,
      })),
      ...tonality.bands.map(({ nominalHz, blocks }) => ({
        of: 'quarter-hours',
        method: 'survey',
        lowHz: nominalHz,
        highHz: nominalHz,
        excess: null,
        threshold: null,
        blocks,
      })),
    ]),
  );
}

/** Instruments that measured. */
export function instrumentsTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<PeriodInstrument>>(
    {
      name: 'instruments',
      title: 'Instruments',
      description: 'Instruments on record, each for its part of the month.',
      key: ['station', 'serial_number', 'from'],
    },
    [
      station,
      text('serial_number', 'Serial number', ({ of }) => of.serialNumber),
      count('class', 'Class of IEC 61672-1', ({ of }) => of.class),
      text('description', 'Description', ({ of }) => of.description),
      text('microphone', 'Microphone', ({ of }) => of.microphone),
      instant('from', 'From', ({ of }) => of.from),
      instant('to', 'To', ({ of }) => of.to),
      instant('last_check', 'Latest check before the end of its part', ({ of }) => of.lastCheck?.at),
      level('last_check_drift_db', 'What that check found', ({ of }) => of.lastCheck?.drift),
      truth(
        'last_check_within_bound',
        'Whether that is within the bound',
        ({ of }) => of.lastCheck?.isWithinBound,
      ),
    ],
    each(doc, ({ instruments }) => instruments),
  );
}

/** Checks with a calibrator in the month. */
export function calibrationsTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<DocumentCalibration>>(
    {
      name: 'calibrations',
      title: 'Calibrations',
      description: 'Standing checks with a calibrator in the month.',
      key: ['station', 'serial_number', 'checked_at'],
    },
    [
      station,
      text('serial_number', 'Instrument', ({ of }) => of.serialNumber),
      instant('checked_at', 'When', ({ of }) => of.checkedAt),
      text('calibrator', 'Calibrator', ({ of }) => of.calibrator),
      level('calibrator_level_db', 'Its level at 1 kHz', ({ of }) => of.calibratorLevel),
      level('before_db', 'Shown before any adjustment', ({ of }) => of.before),
      level('after_db', 'Shown after; empty: not adjusted', ({ of }) => of.after),
      level('drift_db', 'Before less the calibrator’s level', ({ of }) => of.drift),
      level('drift_bound_db', 'The network’s bound', ({ of }) => of.driftBound),
      truth('within_bound', 'Whether the drift is within it', ({ of }) => of.isWithinBound),
    ],
    each(doc, ({ calibrations }) => calibrations),
  );
}

/** Wind by its sources. */
export function weatherTable(doc: MonthDocument): TopicTable {
  return topicTable<Of<WindSource>>(
    {
      name: 'weather',
      title: 'Weather',
      description: 'Wind of the month by the station’s own sensor and by the masts that it went by.',
      key: ['station', 'source', 'from'],
    },
    [
      station,
      text('source', 'Code of the mast; own: the station’s sensor', ({ of }) => of.mast?.code ?? 'own'),
      text('mast_name', 'Name of the mast', ({ of }) => of.mast?.name),
      instant('from', 'From', ({ of }) => of.from),
      instant('to', 'To', ({ of }) => of.to),
      speed('mean_speed_ms', 'Mean wind speed', ({ of }) => of.meanSpeed),
      speed('maximum_speed_ms', 'Highest record', ({ of }) => of.maximumSpeed),
      degrees('direction_deg', 'Where the mean wind came from', ({ of }) => of.direction),
      plainNumber('seconds', 'Time that it tells of, s', ({ of }) => of.seconds),
    ],
    each(doc, ({ wind }) => wind),
  );
}
