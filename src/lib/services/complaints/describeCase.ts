import { findStationById } from '#db/queries/stations';
import type { NetworkRow } from '#db/queries/networks';

import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import type { WindowStrip } from '#lib/contracts/windowStrip';
import { comparedParagraph } from './letter/compared';
import { draftReply } from './letter/draftReply';
import { instantSec } from './letter/instants';
import { limitsParagraph } from './letter/limits';
import { dataState, type Whereabouts } from './letter/measured';
import { tonesParagraph } from './letter/tones';
import type { ComplaintCase } from './openCase';
import { distanceInWords } from './whereabouts';
import { windowStrip } from '../strip/windowStrip';

/** A case in words and as a drawing, for its page. */
export interface DescribedCase {
  /** The letter that a person goes on with. */
  draft: string;
  /** What the nearest station's figures mean, in the letter's own sentences. */
  findings: string[];
  /** Where stations stand seen from the resident, by code; empty where that is not known or not the reader's to see. */
  where: Record<string, string>;
  /** Null without a station. */
  strip: WindowStrip | null;
}

/** Describes an opened case; `signedBy` is the name of the person who reads it and may answer. */
export async function describeCase(
  found: ComplaintCase,
  network: NetworkRow,
  signedBy: string,
  now: Date,
): Promise<DescribedCase> {
  const { row, evidence, whereabouts, person } = found;
  const [nearest] = evidence.stations;
  const station = row.nearestStationId === null ? undefined : await findStationById(row.nearestStationId);
  const window = { fromSec: row.startsAtSec, toSec: row.endsAtSec };
  return {
    draft: draftReply({
      reference: row.reference,
      networkName: network.name,
      kind: row.kind,
      recipientName: person?.contact.name ?? null,
      signedBy,
      evidence,
      whereabouts,
    }),
    findings: nearest ? findingsOf(nearest, evidence.from, evidence.timeZone) : [],
    where: Object.fromEntries(
      Object.entries(whereabouts).map(([code, stands]) => [code, standsInWords(stands)]),
    ),
    strip: station ? await windowStrip(station, window, Math.floor(now.getTime() / 1000)) : null,
  };
}

function findingsOf(nearest: StationEvidence, from: string, zone: string): string[] {
  const compared =
    dataState(nearest) === 'enough' && nearest.LAeq !== null
      ? [comparedParagraph(nearest.LAeq, nearest.usual, instantSec(from), zone), tonesParagraph(nearest)]
      : [];
  return [...compared, limitsParagraph(nearest, zone)].filter((finding) => finding !== '');
}

function standsInWords({ distanceM, wind }: Whereabouts): string {
  const distance = distanceInWords(distanceM);
  return distance.startsWith('at') ? distance : `${distance} to the ${wind}`;
}
