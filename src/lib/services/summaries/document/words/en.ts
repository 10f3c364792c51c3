import { type Convention } from '#lib/contracts/summaries';
import { INVALIDITY_WORDS } from '#lib/format/invalidityReason';
import { type MethodFormat, type MonthWords } from './words';

const METHOD_OF_TONE = {
  survey: 'survey method, ISO 1996-2:2017 Annex K',
  'adjacent-pair': 'pair of adjacent bands, Bittern’s own addition',
};
const BASIS = {
  'class-1': 'class 1',
  'class-2': 'class 2',
  'class-1-assumed': 'class 1 assumed, none is on record',
};

export const ENGLISH: MonthWords = {
  language: 'en',
  tag: 'en-GB',
  decimal: '.',
  sections: {
    stations: 'Stations',
    limits: 'Limits in force',
    compliance: 'Compliance',
    exceedances: 'Exceedances',
    'year-to-date': 'Year to date',
    days: 'Day by day',
    'heat-map': 'Hour by day',
    bands: 'Bands over the month',
    octaves: 'Octaves',
    spectrogram: 'Spectrogram of the month',
    tonality: 'Tones and low frequencies',
    exclusions: 'What was left out, and its effect',
    calibrations: 'Calibration checks',
    weather: 'Weather',
    complaints: 'Complaints',
    glossary: 'Glossary',
    method: 'How these figures are made',
    cautions: 'Cautions',
    'sign-off': 'Sign-off',
    seal: 'Seal',
  },
  columns: {
    station: 'Station',
    date: 'Date',
    figure: 'Figure',
    over: 'Over',
    level: 'Level, dB',
    coverage: 'Coverage',
    limit: 'Limit',
    compared: 'Compared',
    from: 'From',
    to: 'To',
    version: 'Version',
    inForce: 'In force',
    state: 'State',
    cause: 'Cause',
    windows: 'Windows compared',
    exceedances: 'Exceedances',
    highest: 'Highest',
    band: 'Band',
    reason: 'Reason',
    duration: 'Time',
    withRules: 'As summarised',
    everything: 'Everything',
    difference: 'Difference',
    instrument: 'Instrument',
    checkedAt: 'Checked',
    calibrator: 'Calibrator',
    found: 'Found',
    drift: 'Drift',
    source: 'Source',
    meanSpeed: 'Mean',
    maximumSpeed: 'Highest',
    direction: 'From',
    term: 'Term',
    meaning: 'Meaning',
    quarters: 'Quarter-hours',
  },
  monthName,
  title: (month) => `Noise summary, ${monthName(month)}`,
  draft: 'Draft, not issued',
  revision: (number) => `Revision ${number}`,
  toDate: 'to date',
  issued: (name, at) => `Issued by ${name}, ${at}.`,
  computed: (at) => `Computed ${at}; figures follow the data as of then.`,
  notOver: 'The month, or its last night, is not over: every figure is to date.',
  page: (page, pages) => `${page} of ${pages}`,
  contents: 'Contents',
  over: {
    days: 'days',
    evenings: 'evenings',
    nights: 'nights',
    pooled: 'pooled days, evenings and nights',
    month: 'whole month',
  },
  ofSamples: (seconds) => `whole month, of LAeq,${seconds} s`,
  maximumAt: (at) => `in the interval from ${at}`,
  belowMinimum: 'coverage below the minimum: for information, never compared with a limit.',
  complaints: ({ open, answered, closed }) => {
    const total = open + answered + closed;
    return total === 0
      ? 'No complaint about noise in this month is on record.'
      : `Complaints about noise that began in this month: ${total}, of which ${answered} answered, ${open} open, ${closed} closed without a reply.`;
  },
  measuredBy: 'Measured by',
  noInstrument: 'no instrument is on record',
  bandsAre: (fraction, seconds) =>
    `${fraction === 3 ? 'one-third-octave bands' : 'octave bands'}, every ${seconds} s`,
  microphone: (metres) => `microphone at ${metres} m`,
  placements: { 'free-field': 'free field', facade: 'at a façade' },
  correction: (db) => `correction for incident sound ${db} dB, not applied to the levels below`,
  stands: (from, to, coverage) => {
    if (from === null && to === null) return null;
    const since = from === null ? '' : `Registered ${from}, within the month. `;
    const until = to === null ? '' : `Retired ${to}. `;
    return `${since}${until}${coverage === null ? '' : `Coverage since the registration ${coverage}.`}`.trim();
  },
  noData: 'No valid data of this station are on record for this month.',
  none: {
    limits: 'No limit was in force in this month.',
    exceedances: 'None is on record for this month.',
    exclusions: 'No operator’s exclusion touches this month.',
    calibrations: 'No check with a calibrator is on record within this month.',
    weather: 'Wind was not measured: no sensor, no mast.',
    leftOut: 'Nothing that was measured was left out.',
  },
  more: (count) => `and ${count} more, listed in the files with data.`,
  limitText: (text) => text,
  compliance: {
    exceeded: 'exceeded',
    'not-exceeded': 'not exceeded',
    'not-compared': 'too little data to compare',
  },
  lifted: (count) => `${count} lifted`,
  exceedanceStates: { standing: 'standing', lifted: 'lifted' },
  causes: {
    plant: 'plant',
    loading: 'loading',
    'building-works': 'building works',
    vehicles: 'vehicles',
    rail: 'rail',
    vessels: 'vessels',
    aircraft: 'aircraft',
    people: 'people',
    weather: 'weather',
    animals: 'animals',
    instrument: 'instrument',
    'not-found': 'not found',
    other: 'other',
  },
  noCause: 'not yet decided',
  reasons: INVALIDITY_WORDS,
  ownSensor: 'the station’s own sensor',
  mast: (code, name) => `mast ${code} (${name})`,
  captions: {
    days: 'The night is the one that begins on the date; LAeq, LA10 to LA90 and LAFmax are of the civil day.',
    heatMap:
      'LAeq of each hour of the clock on the wall. Hatched: coverage below the minimum; empty: no valid data.',
    bands: (coverage) => `Unweighted levels: bar Leq, long tick L10, short tick L90. Coverage ${coverage}.`,
    spectrogram: 'Unweighted Leq of each band and hour. White: no valid data.',
    effect:
      'The same figures with and without what validity rules and exclusions leave out. Data left out stay on record.',
    yearToDate: (from, to) => `From ${from} to ${to}: all energies pooled, months are never averaged.`,
  },
  axes: {
    hour: 'Hour of the day',
    date: 'Day of the month',
    frequency: 'Nominal mid-band frequency, Hz',
    noLevel: 'no valid data',
  },
  alternatives: {
    heatMap: (station, low, high) =>
      `Heat map of hourly LAeq at ${station}: the hours of each day from ${low} dB to ${high} dB. The levels are in the table of hours of the workbook and the CSV files.`,
    bands: (station) =>
      `Bar chart of the band levels of the month at ${station}, with L10 and L90; the table of bands has the same levels.`,
    spectrogram: (station) => `Picture of the hourly band levels of the month at ${station}.`,
    trend: (station) =>
      `Lden, Lday and Lnight of each date at ${station}; the table day by day has the same levels.`,
  },
  tonality: {
    notAssessable: {
      'no-data': 'There are no valid data to look for tones in.',
      'octave-bands': 'Not assessable: octave bands cannot show a tone, which is not the same as none.',
      'no-neighbours': 'Not assessable: no band has both neighbours.',
      'averaged-too-short': 'Not assessable: less than 60 s of data.',
    },
    none: 'The mean spectrum of the month shows no tone by the survey method.',
    tone: (range, excess, method) =>
      `A tone within ${range} stands ${excess} dB above its louder neighbour in the mean spectrum (${METHOD_OF_TONE[method]}). A band tells a range, not a frequency.`,
    blocks: (tonal, assessed) =>
      assessed === 0
        ? 'No quarter-hour could be looked at for tones.'
        : `Of ${assessed} quarter-hours, each by its mean spectrum, ${tonal} show a tone by the survey method.`,
    lowFrequency: (difference, bound, isAbove) =>
      `LCeq − LAeq of the month is ${difference} dB, ${isAbove ? 'above' : 'not above'} the screening bound of ${bound} dB.`,
    lowFrequencyBlocks: (above, assessed) =>
      `Of ${assessed} quarter-hours with both levels, ${above} are above the bound.`,
    noLowFrequency: 'Low frequencies cannot be screened: no LCeq was measured.',
  },
  uncertainty: ({ instrument, basis, drift, driftKnown, gaps }, format) =>
    `U is the expanded uncertainty, U = 2u (ISO 1996-2), of the instrument ${format(instrument)} dB (${BASIS[basis]}), calibration drift ` +
    `${format(drift)} dB${driftKnown === 'both' ? '' : ' (checks do not enclose the month)'} and, for LAeq, gaps ${gaps === null ? 'that cannot be told' : `${format(gaps)} dB`}. Site, weather and source are not in it.`,
  method: (doc, format) => [
    ...doc.conventions.flatMap((convention) => conventionSentences(convention, format)),
    'A night belongs to the date on which it begins. Lday, Levening, Lnight and Lden of the month and of the year to date pool the ' +
      'periods that begin in it, so that Lnight includes the first hours of the next month and not those of its own first morning. ' +
      'LAeq, LAFmax, the statistical levels and the bands pool the calendar month by the clock. The two are not of the same hours.',
    ...(format.clockChange === null
      ? []
      : [
          `The clock changes on ${format.clockChange.at}; that date has ${format.clockChange.hours} hours, and the night in which the change falls is longer or shorter than its nominal hours.`,
        ]),
    'Levels of a period are energy means over the valid time alone: the energies of all its valid intervals are pooled first, and Lden ' +
      'is calculated once from the pooled levels, with the nominal hours of day, evening and night. A date that lacks a whole period ' +
      'has no Lden. Where the periods of day changed within the month there is no Lden of the month.',
    'Statistical levels (LA10, LA50, LA90 and those of bands) are taken from the base samples, the LAeq of each interval, rounded half up ' +
      'to 0.1 dB. They are given from 30 samples on, and not at all where the length of the intervals changed within the time. They are ' +
      'never averaged; those of octaves come from each interval’s own sums of thirds.',
    'Coverage is the valid time divided by the time that has elapsed, whenever the station was registered. † marks a figure whose coverage ' +
      'is below the minimum: it is given for information and is not compared with a limit. Missing data are not silence.',
    'Exceedances are listed by the calendar month in which their window begins, each judged by the version of the limit in force at that ' +
      'moment: the level, rounded half up to tenths, is greater than the limit. One that later data or an exclusion took below its limit ' +
      'is listed as lifted. “Not exceeded” speaks of the windows that had enough data to be compared, of no others.',
    'The uncertainty of a level combines the instrument’s class, the drift that calibration checks show, and what gaps bring in, ' +
      '4.34·s/m·((1 − c)/n)^0.5 over the n hourly energies (mean m, spread s, coverage c), which assumes that gaps fall at random. That of Lden weighs day, evening and night ' +
      'by their shares of its energy and takes their gaps as independent. That of the year to date is made likewise, of all its hours, checks and instruments.',
    'Tones are looked for in the mean spectrum of the month and of each quarter-hour, by the survey method of ISO 1996-2:2017 Annex K. ' +
      'A mean over a month hides tones that come and go.',
    'Levels here are rounded once, half up, to 0.1 dB; the files with data carry them unrounded.',
  ],
  cautions: [
    'Levels describe the places of the stations as installed, not the exposure of a person or the level at a dwelling.',
    'Health guideline values are context, not limits.',
    'This summary supports a professional judgement and does not replace one: local law, permits and the competent authority decide.',
  ],
  glossary: [
    ['dB', 'Decibel re 20 µPa. An increase of 10 dB is ten times the energy.'],
    [
      'LAeq',
      'Equivalent continuous level: the steady level that has the same A-weighted energy over the same time.',
    ],
    ['Lday', 'LAeq of the day periods.'],
    ['Levening', 'LAeq of the evening periods.'],
    ['Lnight', 'LAeq of the night periods; a night belongs to the date on which it begins.'],
    [
      'Lden',
      'Day-evening-night level, Directive 2002/49/EC Annex I: evenings with 5 dB, nights with 10 dB added.',
    ],
    ['LA10', 'Level exceeded for 10 % of the valid time: of the louder moments.'],
    ['LA90', 'Level exceeded for 90 % of the valid time: of the background.'],
    ['LAFmax', 'Highest level with time weighting F.'],
    ['Leq', 'Equivalent level of a band, without weighting.'],
    ['LCeq', 'Equivalent level with C-weighting, in which low frequencies count more.'],
    ['Coverage', 'Share of the time for which there are valid data.'],
    ['U', 'Expanded uncertainty: the true level lies within ± U with a confidence of about 95 %.'],
  ],
  signOff: { prepared: 'Prepared by, date', reviewed: 'Reviewed by, date', issued: 'Issued by, date' },
  seal: {
    digest: 'SHA-256 of the data used',
    year: 'SHA-256 of the sums of the months before, for the year to date',
    software: 'Version of the software',
    key: 'Public key of the network',
    chain: 'Head of the audit chain',
    verify: 'Whether a file is the issued one is told at',
  },
};

function monthName(month: string): string {
  return new Intl.DateTimeFormat('en-GB', { month: 'long', year: 'numeric', timeZone: 'UTC' }).format(
    Date.parse(`${month}-01T00:00:00Z`),
  );
}

function conventionSentences(convention: Convention, { instant, coverage }: MethodFormat): string[] {
  const { from, day, evening, night, minimumCoverage, maximumWindSpeed, excludeRain, timeZone } = convention;
  const since = from === null ? '' : `From ${instant(from)} on: `;
  const periods =
    evening === null ? `day ${day}–${night}` : `day ${day}–${evening}, evening ${evening}–${night}`;
  return [
    `${since}Times are civil times of the zone ${timeZone}; ${periods}, night ${night}–${day}. The minimum coverage is ${coverage(minimumCoverage)}.`,
    `${since}Intervals are left out when the monitor flags calibration, self-check, overload, tampering, power loss, a set clock or wind, ` +
      `when the wind is above ${maximumWindSpeed} m/s${excludeRain ? ', when rain is flagged or told by the mast' : ''}, and where an operator ` +
      'excluded the time with a reason. They stay on record.',
  ];
}
