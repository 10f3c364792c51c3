import { bandRange } from '#lib/acoustics/bands';
import { MONTH_DOCUMENT_FORM, type DocumentStation, type MonthDocument } from '#lib/contracts/monthDocument';
import { COMPARED, type DocumentBand } from '#lib/contracts/monthEvidence';
import { type CoveredSeconds, type DocumentDay, type Uncertainties } from '#lib/contracts/monthFigures';
import { monthHead, summaryStation } from './summaryFixture';

/** Levels that no other figure has, so that one that stands in a wrong place shows. */
class Distinct {
  #count: number;

  constructor(station: number) {
    this.#count = station * 5000;
  }

  level(around = 40): number {
    this.#count += 1;
    return around + ((this.#count * 0.7137) % 25);
  }

  uncertainties(): Uncertainties {
    const [LAeq, Lday, Levening, Lnight, Lden] = Array.from({ length: 5 }, () => this.level(1));
    return {
      LAeq: LAeq ?? 0,
      Lday: Lday ?? 0,
      Levening: Levening ?? 0,
      Lnight: Lnight ?? 0,
      Lden: Lden ?? 0,
    };
  }

  covered(expected: number): CoveredSeconds {
    this.#count += 1;
    const valid = expected - 60 * (this.#count % 97);
    return {
      seconds: { expected, valid, excluded: 60 },
      coverage: valid / expected,
      meetsMinimum: true,
    };
  }
}

const LIMIT = { limitId: 7, limitVersion: 2 };

/** A station of which everything is known; on the fifth its night is short, on the tenth its evening is missing. */
export function documentStation(code: string, number = 1): DocumentStation {
  const distinct = new Distinct(number);
  const summary = summaryStation(code, number / 1000);
  const band = (nominalHz: number): DocumentBand => ({
    nominalHz,
    Leq: distinct.level(),
    L10: distinct.level(),
    L50: distinct.level(),
    L90: distinct.level(-30),
    coverage: 0.97,
  });
  const days = summary.days.map((day, at): DocumentDay => ({
    ...day,
    LAeq24h: distinct.level(),
    LAFmax: distinct.level(70),
    LA10: distinct.level(),
    LA50: distinct.level(),
    LA90: distinct.level(),
    ...distinct.covered(at === 28 ? 82_800 : 86_400),
    sampleSeconds: 60,
    hours: at === 28 ? 23 : 24,
    U: distinct.uncertainties(),
  }));
  return {
    ...summary,
    standsFrom: '2025-11-02T09:00:00.000Z',
    standsTo: null,
    coverageSinceRegistration: 0.9812,
    figures: {
      ...summary.figures,
      seconds: { expected: 2_674_800, valid: 2_624_500, excluded: 1260 },
      LCeq: distinct.level(),
      LAFmin: distinct.level(20),
      LCpeak: distinct.level(90),
      LA1: distinct.level(),
      LA5: distinct.level(),
      LA95: distinct.level(),
      LA99: distinct.level(),
      incident: distinct.level(),
      U: distinct.uncertainties(),
      uncertainty: { instrument: 0.5, basis: 'class-1', drift: 0.12, driftKnown: 'both', gaps: 0.034 },
    },
    yearToDate: {
      from: '2026-01-01T00:00:00Z',
      to: '2026-03-31T23:00:00Z',
      Lday: distinct.level(),
      Levening: distinct.level(),
      Lnight: distinct.level(),
      Lden: distinct.level(),
      LAeq: distinct.level(),
      LA10: distinct.level(),
      LA50: distinct.level(),
      LA90: distinct.level(),
      LAFmax: distinct.level(70),
      sampleSeconds: 60,
      ...distinct.covered(7_776_000),
      U: distinct.uncertainties(),
    },
    days,
    hours: days.flatMap(({ date }) =>
      Array.from({ length: 24 }, (_, hour) => hour)
        .filter((hour) => date !== '2026-03-29' || hour !== 1)
        .map((hour) => ({
          date,
          hour,
          turn: 0 as const,
          LAeq: distinct.level(),
          coverage: 1,
          meetsMinimum: hour !== 5,
        })),
    ),
    bands: bandRange(3, 25, 8000).map(({ nominalHz }) => band(nominalHz)),
    octaves: [31.5, 63, 125, 250, 500, 1000, 2000, 4000].map(band),
    spectrogram: {
      from: '2026-03-01T00:00:00Z',
      columnSeconds: 3600,
      columns: 3,
      bandsHz: [100, 125],
      firstDb: -20,
      stepDb: 0.5,
      codes: Buffer.from([120, 130, 0, 0, 150, 160]).toString('base64'),
    },
    tonality: {
      notAssessable: null,
      tones: [{ method: 'survey', lowerHz: 89.13, upperHz: 112.2, excess: 17.3, threshold: 15 }],
      blockSeconds: 900,
      assessedBlocks: 2871,
      tonalBlocks: 313,
      bands: [{ nominalHz: 100, blocks: 301 }],
    },
    lowFrequency: { bound: 15, difference: 16.21, isAbove: true, assessedBlocks: 2870, blocksAbove: 411 },
    exclusions: {
      items: [{ from: '2026-03-12T08:00:00Z', to: '2026-03-12T10:30:00Z', reason: '=cmd|crane, "loading"' }],
      leftOut: [{ reason: 'mast-wind', seconds: 1260 }],
      figures: COMPARED.map((quantity) => {
        const valid = summary.figures[quantity];
        const all = distinct.level();
        return { quantity, valid, all, difference: valid === null ? null : valid - all };
      }),
    },
    exceedances: {
      ...summary.exceedances,
      items: summary.exceedances.items.map((item, at) => ({
        ...item,
        ...LIMIT,
        cause: at === 0 ? 'loading' : null,
        causeDetail: at === 0 ? 'Grain ship' : null,
        isAcknowledged: at === 0,
      })),
    },
    compliance: [
      {
        ...LIMIT,
        limit: '=Night hours, "quiet"',
        metric: 'LAeq,1 h',
        threshold: 50,
        unit: 'dB',
        windows: { ended: 248, compared: 241 },
        standing: 1,
        lifted: 1,
        highest: 52.34,
        state: 'exceeded',
      },
    ],
    calibrations: [
      {
        serialNumber: 'BT-0417',
        checkedAt: '2026-03-03T10:00:00Z',
        calibrator: 'Calibrator 77',
        calibratorLevel: 94.01,
        before: 94.13,
        after: null,
        drift: 0.12,
        driftBound: 0.5,
        isWithinBound: true,
      },
    ],
    wind: [
      {
        mast: { code: 'MAST-1', name: 'Pier mast' },
        from: '2026-03-01T00:00:00Z',
        to: '2026-03-31T23:00:00Z',
        meanSpeed: 3.217,
        maximumSpeed: 11.4,
        direction: 231,
        seconds: 2_600_000,
      },
    ],
  };
}

/** A station that stood and sent nothing. */
export function silentStation(code: string): DocumentStation {
  const station = documentStation(code, 3);
  const none = { coverage: 0, meetsMinimum: false };
  const periods = { day: none, evening: none, night: none, whole: none };
  const noLevels = { Lday: null, Levening: null, Lnight: null, Lden: null };
  const noStatistics = { LA10: null, LA50: null, LA90: null, LAFmax: null, sampleSeconds: null };
  const U = { LAeq: null, ...noLevels };
  const seconds = { expected: 86_400, valid: 0, excluded: 0 };
  return {
    ...station,
    figures: {
      ...station.figures,
      ...noLevels,
      ...noStatistics,
      ...none,
      ...{ LAeq: null, LCeq: null, LAFmin: null, LCpeak: null, LA1: null, LA5: null, LA95: null, LA99: null },
      incident: null,
      LAFmaxAt: null,
      periods,
      seconds,
      U,
    },
    yearToDate: { ...station.yearToDate, ...noLevels, ...noStatistics, ...none, LAeq: null, seconds, U },
    days: station.days.map((day) => ({
      ...day,
      ...noLevels,
      ...noStatistics,
      ...none,
      LAeq24h: null,
      periods,
      seconds,
      U,
    })),
    hours: station.hours.map((hour) => ({ ...hour, LAeq: null, ...none })),
    bands: [],
    octaves: [],
    spectrogram: null,
    tonality: { ...station.tonality, notAssessable: 'no-data', tones: [], bands: [] },
    lowFrequency: { ...station.lowFrequency, difference: null, isAbove: false },
    exclusions: { items: [], leftOut: [], figures: [] },
    exceedances: { standing: 0, lifted: 0, items: [] },
    compliance: [],
    calibrations: [],
    wind: [],
  };
}

/** Two stations, one of them without data. */
export function documentOf(stations: DocumentStation[], changes: Partial<MonthDocument> = {}): MonthDocument {
  return {
    ...monthHead(),
    form: MONTH_DOCUMENT_FORM,
    nightsTo: '2026-04-01T06:00:00Z',
    limits: [
      {
        id: LIMIT.limitId,
        version: LIMIT.limitVersion,
        name: '=Night hours, "quiet"',
        metric: 'LAeq',
        descriptor: 'LAeq,1 h',
        threshold: 50,
        unit: 'dB',
        weekdays: ['mon', 'tue'],
        holidays: 'as-weekday',
        from: null,
        to: null,
        minimumCoverage: null,
        windWords: null,
        stations: null,
        groupName: null,
        reason: 'Permit',
        effectiveFrom: '2026-03-10T00:00:00Z',
        effectiveTo: null,
      },
    ],
    stations,
    ...changes,
  };
}
