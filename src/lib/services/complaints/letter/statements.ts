import type { StationEvidence } from '#lib/contracts/complaintEvidence';
import { comparedParagraph } from './compared';
import { nearestOf, othersOf, type LetterFacts } from './facts';
import { instantSec } from './instants';
import { limitsParagraph } from './limits';
import { dataState, measuredParagraph } from './measured';
import { clockChangeMinutes, windowInWords } from './times';
import { tonesParagraph } from './tones';
import { numberInWords, REPORTED } from './words';

const NO_STATION =
  'None of our stations was measuring near you at that time, so we have no figures that could confirm or rule out what you heard.';

const CAUTION =
  'All levels describe the place where the station stands, not your home: distance, buildings and windows change what reaches ' +
  'you. Whether a noise is permitted is decided by the rules that apply here and by the competent authority, not by us.';

/** The window as the letter names it. */
export function windowText({ evidence }: LetterFacts): string {
  return windowInWords(instantSec(evidence.from), instantSec(evidence.to), evidence.timeZone);
}

export function opening(facts: LetterFacts): string {
  return (
    `Thank you for telling us about ${REPORTED[facts.kind]} ${windowText(facts)}. I am sorry that you were disturbed. ` +
    `Your report has the reference ${facts.reference}. This is what our measurements show.`
  );
}

export function clockChange({ evidence }: LetterFacts): string {
  const minutes = clockChangeMinutes(instantSec(evidence.from), instantSec(evidence.to), evidence.timeZone);
  if (minutes === 0) return '';
  return (
    `The clocks went ${minutes > 0 ? 'forward' : 'back'} by ${Math.abs(minutes)} minutes around that time. Each time in this ` +
    'letter therefore carries its distance from universal time (UTC), so that it can mean one moment only.'
  );
}

/** What the nearest station measured, or that it did not, or that there is none. */
export function measured(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  return nearest ? measuredBy(nearest, 'Our nearest station,', facts) : NO_STATION;
}

export function compared(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  return nearest ? comparedAt(nearest, facts) : '';
}

export function limits(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  return nearest ? limitsParagraph(nearest, facts.evidence.timeZone) : '';
}

export function tones(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  return nearest && dataState(nearest) === 'enough' ? tonesParagraph(nearest) : '';
}

/** Another station's story, told only where the nearest one lacks data. */
export function elsewhere(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  if (!nearest || dataState(nearest) === 'enough') return '';
  const measuring = othersOf(facts).find((station) => dataState(station) === 'enough');
  if (!measuring) return '';
  return [
    'A station further away did measure; it tells less about where you are.',
    measuredBy(measuring, 'Our station', facts),
    comparedAt(measuring, facts),
    limitsParagraph(measuring, facts.evidence.timeZone),
    tonesParagraph(measuring),
  ]
    .filter((paragraph) => paragraph !== '')
    .join('\n\n');
}

/** How many others reported around that time and place; counts alone. */
export function otherReports({ reports }: LetterFacts): string {
  if (!reports) return '';
  const { count, sameKind, withinKm, withinHours } = reports;
  const around = `within ${withinKm} km and ${withinHours} hours of yours`;
  if (count === 0) return `We have no other report from ${around}. That does not make yours count for less.`;
  const others = count === 1 ? 'One other report has' : `${capital(numberInWords(count))} other reports have`;
  const alike = sameKind === 0 ? '' : `, ${numberInWords(sameKind)} of them about a sound of the same kind`;
  return `${others} reached us from ${around}${alike}.`;
}

export function caution(): string {
  return CAUTION;
}

export function again({ reference }: LetterFacts): string {
  return (
    `If it happens again, please tell us when it began and ended, as exactly as you can, and quote ${reference}: each ` +
    'report helps to find what makes the sound.'
  );
}

function measuredBy(station: StationEvidence, noun: string, { evidence, whereabouts }: LetterFacts): string {
  return measuredParagraph(noun, station, whereabouts[station.station] ?? null, evidence.minimumCoverage);
}

function comparedAt(station: StationEvidence, { evidence }: LetterFacts): string {
  if (dataState(station) !== 'enough' || station.LAeq === null) return '';
  return comparedParagraph(station.LAeq, station.usual, instantSec(evidence.from), evidence.timeZone);
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
