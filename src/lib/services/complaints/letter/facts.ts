import type { Evidence, StationEvidence } from '#lib/contracts/complaintEvidence';
import type { ComplaintKind } from '#lib/contracts/complaints';
import type { OtherReports } from '#lib/contracts/evidencePack';
import type { Whereabouts } from './measured';

/** Everything that a letter is written from. */
export interface LetterFacts {
  reference: string;
  networkName: string;
  kind: ComplaintKind;
  /** Name of the resident; null where it is not known. */
  recipientName: string | null;
  /** Name of the person who answers. */
  signedBy: string;
  evidence: Evidence;
  /** By station code; none where the resident's exact place is not known. */
  whereabouts: Readonly<Record<string, Whereabouts>>;
  /** Left out where it was not counted. */
  reports?: OtherReports;
}

/** The nearest station; undefined where there is none. */
export function nearestOf({ evidence }: LetterFacts): StationEvidence | undefined {
  return evidence.stations[0];
}

/** The other stations, the nearest to the resident first as far as that is known. */
export function othersOf({ evidence, whereabouts }: LetterFacts): StationEvidence[] {
  const farness = ({ station }: StationEvidence) => whereabouts[station]?.distanceM ?? Infinity;
  return evidence.stations.slice(1).sort((a, b) => farness(a) - farness(b));
}
