import { bandRange } from '#lib/acoustics/bands';
import { type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import {
  type MonthLevels,
  type SummaryBand,
  type SummaryDay,
  type SummaryExceedance,
} from '#lib/contracts/summaries';

const full = { coverage: 1, meetsMinimum: true };
const periods = { day: full, evening: full, night: full, whole: full };

/** What the fixtures of documents build on. */
type Station = Omit<
  DocumentStation,
  | 'figures'
  | 'bands'
  | 'days'
  | 'exceedances'
  | 'standsFrom'
  | 'standsTo'
  | 'coverageSinceRegistration'
  | 'yearToDate'
  | 'hours'
  | 'octaves'
  | 'spectrogram'
  | 'tonality'
  | 'lowFrequency'
  | 'exclusions'
  | 'compliance'
  | 'calibrations'
  | 'wind'
> & {
  figures: MonthLevels;
  bands: SummaryBand[];
  days: SummaryDay[];
  exceedances: { standing: number; lifted: number; items: SummaryExceedance[] };
};

/** Figures that tell each other apart: every level is another number with four decimals and more. */
export function summaryStation(code: string, offsetDb = 0): Station {
  const level = (db: number) => db + offsetDb + 0.0123456;
  const days = Array.from({ length: 31 }, (_, at): SummaryDay => {
    const short = at === 4 ? { coverage: 0.4123, meetsMinimum: false } : full;
    return {
      date: `2026-03-${String(at + 1).padStart(2, '0')}`,
      Lday: level(55 + at / 10),
      Levening: at === 9 ? null : level(50 + at / 10),
      Lnight: level(44 + at / 10),
      Lden: at === 9 ? null : level(56 + at / 10),
      periods: { ...periods, night: short, whole: short },
    };
  });
  return {
    code,
    name: `Station ${code}`,
    latitude: 54.1,
    longitude: 1.6,
    placement: 'free-field',
    mastHeightMetres: 4,
    bandFraction: 3,
    intervalSeconds: 60,
    placements: [
      {
        from: '2026-03-01T00:00:00Z',
        to: '2026-04-01T00:00:00Z',
        placement: 'free-field',
        correction: 0,
      },
    ],
    instruments: [],
    masts: [],
    figures: {
      Lday: level(56.1),
      Levening: level(52.2),
      Lnight: level(46.3),
      Lden: level(57.4),
      LAeq: level(54.5),
      LA10: level(57.6),
      LA50: level(48.7),
      LA90: level(39.8),
      LAFmax: level(91.9),
      LAFmaxAt: '2026-03-17T03:41:00Z',
      sampleSeconds: 60,
      coverage: 0.9812,
      meetsMinimum: true,
      periods,
    },
    bands: bandRange(3, 25, 8000).map((band, at) => ({
      nominalHz: band.nominalHz,
      Leq: level(60 - at),
      L10: level(63 - at),
      L50: level(55 - at),
      L90: level(50 - at),
    })),
    days,
    exceedances: {
      standing: 1,
      lifted: 1,
      items: [
        {
          id: 1,
          limit: '=Night hours, "quiet"',
          metric: 'LAeq,1 h',
          from: '2026-03-17T03:00:00Z',
          to: '2026-03-17T04:00:00Z',
          level: 52.34,
          threshold: 50,
          unit: 'dB',
          coverage: 1,
          state: 'standing',
        },
        {
          id: 2,
          limit: 'Tones',
          metric: 'tonal share of 15 min, in per cent',
          from: '2026-03-18T03:00:00Z',
          to: '2026-03-18T03:15:00Z',
          level: 26.04,
          threshold: 20,
          unit: '%',
          coverage: 0.5,
          state: 'lifted',
        },
      ],
    },
  };
}

/** A month without its limits and stations. */
export function monthHead(): Omit<MonthDocument, 'form' | 'nightsTo' | 'limits' | 'stations'> {
  return {
    network: { slug: 'merrow', name: 'Merrow estuary' },
    month: '2026-03',
    timeZone: 'Europe/London',
    from: '2026-03-01T00:00:00Z',
    to: '2026-03-31T23:00:00Z',
    isToDate: false,
    generatedAt: '2026-04-02T09:30:00Z',
    conventions: [
      {
        from: null,
        timeZone: 'Europe/London',
        day: '07:00',
        evening: '19:00',
        night: '23:00',
        minimumCoverage: 0.75,
        maximumWindSpeed: 5,
        excludeRain: false,
      },
    ],
    complaints: { open: 1, answered: 3, closed: 0 },
  };
}
