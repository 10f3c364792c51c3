import { findStationById } from '#db/queries/stations';
import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import type { ChangedFigure, EvidencePack } from '#lib/contracts/evidencePack';
import { windowStrip } from '../strip/windowStrip';
import { comparedParagraph } from './letter/compared';
import { instantSec } from './letter/instants';
import { limitsParagraph } from './letter/limits';
import { dataState, type Whereabouts } from './letter/measured';
import { tonesParagraph } from './letter/tones';
import type { ComplaintCase } from './openCase';
import { changedFigures } from './pack/changedFigures';
import { otherReports } from './pack/otherReports';
import { standingOf } from './pack/representative';
import { distanceInWords } from './whereabouts';

/** A case in words and as drawings, for its page. */
export interface DescribedCase {
  /** What the nearest station's figures mean, in the letter's own sentences. */
  findings: string[];
  /** Where stations stand seen from the resident, by code; empty where that is not known or not the reader's to see. */
  where: Record<string, string>;
  /** As it would go with an answer; without the stations' standings for a reader who may not see the place. */
  pack: EvidencePack;
  /** By reply id: each figure that was sent and is another one now. */
  changes: Record<number, ChangedFigure[]>;
}

/** Describes an opened case. */
export async function describeCase(
  { row, evidence, whereabouts, person, replies }: ComplaintCase,
  now: Date,
): Promise<DescribedCase> {
  const [nearest] = evidence.stations;
  const station = row.nearestStationId === null ? undefined : await findStationById(row.nearestStationId);
  const window = { fromSec: row.startsAtSec, toSec: row.endsAtSec };
  const [strip, reports] = await Promise.all([
    station ? windowStrip(station, window, Math.floor(now.getTime() / 1000)) : null,
    otherReports(row),
  ]);
  const standings = person
    ? evidence.stations.map((one) => standingOf(one, whereabouts[one.station] ?? null))
    : [];
  return {
    findings: nearest ? findingsOf(nearest, evidence.from, evidence.timeZone) : [],
    where: Object.fromEntries(
      Object.entries(whereabouts).map(([code, stands]) => [code, standsInWords(stands)]),
    ),
    pack: { evidence, standings, strip, reports, elsewhere: null },
    changes: Object.fromEntries(replies.map(({ id, figures }) => [id, changedFigures(figures, evidence)])),
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
