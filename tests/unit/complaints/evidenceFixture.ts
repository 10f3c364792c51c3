import type { Evidence, EvidenceExceedance, StationEvidence } from '#lib/contracts/complaintEvidence';
import type { LetterFacts } from '#lib/services/complaints/letter/draftReply';

/** A quiet, well-covered half hour at Ropewalk School; tests change what they are about. */
export function stationEvidence(changes: Partial<StationEvidence> = {}): StationEvidence {
  return {
    station: 'MER-04',
    name: 'Ropewalk School',
    sampleSeconds: 60,
    LAeq: 43.1,
    LAFmax: 58.4,
    LA10: 45.2,
    LA90: 39.8,
    seconds: { expected: 1800, valid: 1800, excluded: 0 },
    coverage: 1,
    meetsMinimum: true,
    usual: { weeks: 4, validWeeks: 4, median: 44.0, low: 42.5, high: 46.1 },
    limits: { set: 2, applying: 1, unjudged: 0 },
    exceedances: [],
    tonality: 'assessed',
    tones: [],
    ...changes,
  };
}

export function letterFacts(
  stations: StationEvidence[],
  evidence: Partial<Evidence> = {},
  changes: Partial<LetterFacts> = {},
): LetterFacts {
  return {
    reference: 'MER-2026-0042',
    networkName: 'Merrow estuary',
    kind: 'hum',
    recipientName: 'Ada Wren',
    signedBy: 'Lia Teal',
    whereabouts: { 'MER-04': { distanceM: 352, wind: 'north-east', bearingDeg: 45 } },
    evidence: {
      from: '2026-03-17T03:10:00Z',
      to: '2026-03-17T03:40:00Z',
      timeZone: 'Europe/London',
      minimumCoverage: 0.75,
      stations,
      digest: 'f'.repeat(64),
      ...evidence,
    },
    ...changes,
  };
}

export function exceedance(changes: Partial<EvidenceExceedance> = {}): EvidenceExceedance {
  return {
    id: 7,
    limit: 'Night hours',
    metric: 'LAeq,1 h',
    from: '2026-03-17T03:00:00Z',
    to: '2026-03-17T04:00:00Z',
    level: 52.3,
    threshold: 50,
    state: 'standing',
    ...changes,
  };
}
