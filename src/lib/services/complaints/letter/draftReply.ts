import type { Evidence, StationEvidence } from '#lib/contracts/complaintEvidence';
import type { ComplaintKind } from '#lib/contracts/complaints';
import { comparedParagraph } from './compared';
import { instantSec } from './instants';
import { limitsParagraph } from './limits';
import { dataState, measuredParagraph, type Whereabouts } from './measured';
import { clockChangeMinutes, windowInWords } from './times';
import { tonesParagraph } from './tones';
import { REPORTED } from './words';

/** Everything that a draft is written from. */
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
}

/**
 * Drafts the letter that a person edits: what was measured at the nearest station in that very time, compared with the same
 * place at the same hours of the weeks before, limits, tones. It never claims more than the data: without data it says so, and
 * below the minimum coverage nothing is compared. Another station is told where the nearest one lacks data.
 */
export function draftReply(facts: LetterFacts): string {
  const { evidence } = facts;
  const [nearest, ...others] = evidence.stations;
  const paragraphs = [
    `Dear ${facts.recipientName ?? 'resident'},`,
    opening(facts),
    clockChange(facts),
    ...(nearest ? stationParagraphs(nearest, 'Our nearest station,', facts) : [NO_STATION]),
    ...(nearest && dataState(nearest) !== 'enough' ? elsewhere(others, facts) : []),
    CAUTION,
    `If it happens again, please tell us when it began and ended, as exactly as you can, and quote ${facts.reference}: each ` +
      'report helps to find what makes the sound.',
    `Yours sincerely,\n${facts.signedBy}\n${facts.networkName}`,
  ];
  return paragraphs.filter((paragraph) => paragraph !== '').join('\n\n');
}

const NO_STATION =
  'None of our stations was measuring near you at that time, so we have no figures that could confirm or rule out what you heard.';

const CAUTION =
  'All levels describe the place where the station stands, not your home: distance, buildings and windows change what reaches ' +
  'you. Whether a noise is permitted is decided by the rules that apply here and by the competent authority, not by us.';

function opening({ kind, reference, evidence }: LetterFacts): string {
  const window = windowInWords(instantSec(evidence.from), instantSec(evidence.to), evidence.timeZone);
  return (
    `Thank you for telling us about ${REPORTED[kind]} ${window}. I am sorry that you were disturbed. ` +
    `Your report has the reference ${reference}. This is what our measurements show.`
  );
}

function clockChange({ evidence }: LetterFacts): string {
  const minutes = clockChangeMinutes(instantSec(evidence.from), instantSec(evidence.to), evidence.timeZone);
  if (minutes === 0) return '';
  return (
    `The clocks went ${minutes > 0 ? 'forward' : 'back'} by ${Math.abs(minutes)} minutes around that time. Each time in this ` +
    'letter therefore carries its distance from universal time (UTC), so that it can mean one moment only.'
  );
}

function stationParagraphs(
  station: StationEvidence,
  noun: string,
  { evidence, whereabouts }: LetterFacts,
): string[] {
  const measured = measuredParagraph(
    noun,
    station,
    whereabouts[station.station] ?? null,
    evidence.minimumCoverage,
  );
  const limits = limitsParagraph(station, evidence.timeZone);
  if (dataState(station) !== 'enough' || station.LAeq === null) return [measured, limits];
  const compared = comparedParagraph(
    station.LAeq,
    station.usual,
    instantSec(evidence.from),
    evidence.timeZone,
  );
  return [measured, compared, limits, tonesParagraph(station)];
}

function elsewhere(others: StationEvidence[], facts: LetterFacts): string[] {
  const farness = ({ station }: StationEvidence) => facts.whereabouts[station]?.distanceM ?? Infinity;
  const [measuring] = others
    .filter((station) => dataState(station) === 'enough')
    .toSorted((a, b) => farness(a) - farness(b));
  if (!measuring) return [];
  const lead = 'A station further away did measure; it tells less about where you are.';
  return [lead, ...stationParagraphs(measuring, 'Our station', facts)];
}
