import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import type { LetterFacts } from '../letter/facts';

/** Cases that a template is tried on, so that its words hold for each. */
export const SAMPLE_CASES = ['ordinary', 'over-limit', 'far', 'partial', 'no-data'] as const;
export type SampleCase = (typeof SAMPLE_CASES)[number];

export const SAMPLE_LABELS: Readonly<Record<SampleCase, string>> = {
  ordinary: 'An ordinary night within the limits',
  'over-limit': 'Over a limit, with a tone',
  far: 'A station that stands far away',
  partial: 'Partial data',
  'no-data': 'No data',
};

const ORDINARY: StationEvidence = {
  station: 'S-1',
  name: 'Sample station',
  sampleSeconds: 60,
  LAeq: 43.1,
  LAFmax: 58.4,
  LA10: 45.2,
  LA90: 39.8,
  seconds: { expected: 1800, valid: 1800, excluded: 0 },
  coverage: 1,
  meetsMinimum: true,
  usual: { weeks: 8, validWeeks: 8, median: 44, low: 42.5, high: 46.1 },
  limits: { set: 1, applying: 1, unjudged: 0 },
  exceedances: [],
  tonality: 'assessed',
  tones: [],
};

const OVER_LIMIT: Partial<StationEvidence> = {
  LAeq: 52.3,
  exceedances: [
    {
      id: 1,
      limit: 'Night hours',
      metric: 'LAeq,1 h',
      from: '2026-03-17T03:00:00Z',
      to: '2026-03-17T04:00:00Z',
      level: 52.3,
      threshold: 50,
      state: 'standing',
    },
  ],
  tones: [{ lowerHz: 89.125, upperHz: 112.2, excess: 15.8, method: 'survey' }],
};

const CHANGES: Readonly<Record<SampleCase, Partial<StationEvidence>>> = {
  ordinary: {},
  'over-limit': OVER_LIMIT,
  far: {},
  partial: { coverage: 0.42, meetsMinimum: false, seconds: { expected: 1800, valid: 756, excluded: 0 } },
  'no-data': {
    sampleSeconds: null,
    LAeq: null,
    LAFmax: null,
    LA10: null,
    LA90: null,
    coverage: 0,
    meetsMinimum: false,
    seconds: { expected: 1800, valid: 0, excluded: 0 },
    tonality: 'no-data',
  },
};

/** Invented figures of a case, for the preview of a template. */
export function sampleFacts(sample: SampleCase, networkName: string, signedBy: string): LetterFacts {
  return {
    reference: 'ABC-2026-0001',
    networkName,
    kind: 'hum',
    recipientName: 'A. Resident',
    signedBy,
    whereabouts: { 'S-1': { distanceM: sample === 'far' ? 2400 : 350, wind: 'north-east', bearingDeg: 45 } },
    reports: { withinHours: 12, withinKm: 2, count: 2, sameKind: 1 },
    evidence: {
      from: '2026-03-17T03:10:00Z',
      to: '2026-03-17T03:40:00Z',
      timeZone: 'UTC',
      minimumCoverage: 0.75,
      stations: [{ ...ORDINARY, ...CHANGES[sample] }],
      digest: '',
    },
  };
}
