import { toTenths } from '#lib/acoustics/rounding';
import { FEWEST_WEEKS, type StationEvidence } from '#lib/contracts/complaintEvidence';
import { distanceInWords } from '../whereabouts';
import { nearestOf, type LetterFacts } from './facts';
import { dataState } from './measured';
import { differenceInWords, levelInWords, shareInWords } from './words';

const NOT_MEASURED = 'not measured';
const NOT_KNOWN = 'not known';

/** A level of the nearest station; with too little data it carries its coverage, without data it says so. */
export function levelFigure(
  read: (station: StationEvidence) => number | null,
): (facts: LetterFacts) => string {
  return (facts) => {
    const nearest = nearestOf(facts);
    const levelDb = nearest ? read(nearest) : null;
    if (!nearest || levelDb === null) return NOT_MEASURED;
    const text = levelInWords(levelDb);
    return dataState(nearest) === 'enough'
      ? text
      : `${text} (measured ${shareInWords(nearest.coverage)} of the time only)`;
  };
}

export function coverageFigure(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  return nearest ? shareInWords(nearest.coverage) : NOT_MEASURED;
}

export function uncertaintyFigure(facts: LetterFacts): string {
  const uncertainty = nearestOf(facts)?.context?.uncertainty;
  return uncertainty === null || uncertainty === undefined ? NOT_KNOWN : `${uncertainty.toFixed(1)} dB`;
}

/** What is usual is told only of enough weeks. */
export function usualRangeFigure(facts: LetterFacts): string {
  const usual = usualOf(facts);
  return usual ? `${usual.low.toFixed(1)} to ${levelInWords(usual.high)}` : NOT_KNOWN;
}

export function usualMiddleFigure(facts: LetterFacts): string {
  const usual = usualOf(facts);
  return usual ? levelInWords(usual.median) : NOT_KNOWN;
}

/** By how much the level differs from the middle of the usual ones, with its direction in words. */
export function differenceFigure(facts: LetterFacts): string {
  const usual = usualOf(facts);
  const nearest = nearestOf(facts);
  if (!usual || !nearest || nearest.LAeq === null || dataState(nearest) !== 'enough') return NOT_KNOWN;
  const tenths = toTenths(nearest.LAeq) - toTenths(usual.median);
  if (tenths === 0) return 'no difference';
  return `${differenceInWords(tenths)} ${tenths > 0 ? 'more' : 'less'}`;
}

/** Percentile rank in words, because "62 %" alone would be misread. */
export function rankFigure(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  const rank = nearest?.context?.rank;
  if (!nearest || rank === null || rank === undefined || !usualOf(facts)) return NOT_KNOWN;
  if (dataState(nearest) !== 'enough') return NOT_KNOWN;
  return `at ${rank} on a scale from 0 (quieter than all) to 100 (louder than all) of the ${nearest.usual.validWeeks} comparable weeks`;
}

export function stationFigure(facts: LetterFacts): string {
  return nearestOf(facts)?.name ?? 'no station';
}

export function distanceFigure(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  const stands = nearest && facts.whereabouts[nearest.station];
  return stands ? distanceInWords(stands.distanceM) : NOT_KNOWN;
}

export function directionFigure(facts: LetterFacts): string {
  const nearest = nearestOf(facts);
  const stands = nearest && facts.whereabouts[nearest.station];
  return stands ? `to the ${stands.wind}` : NOT_KNOWN;
}

function usualOf(facts: LetterFacts): { low: number; median: number; high: number } | null {
  const usual = nearestOf(facts)?.usual;
  if (!usual || usual.validWeeks < FEWEST_WEEKS) return null;
  const { low, median, high } = usual;
  return low === null || median === null || high === null ? null : { low, median, high };
}
