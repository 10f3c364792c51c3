import { toTenths } from '#lib/acoustics/rounding';
import { FEWEST_WEEKS, type StationEvidence } from '#lib/contracts/complaintEvidence';
import { nearestOf, othersOf, type LetterFacts } from './facts';
import { dataState, introduced } from './measured';
import { levelInWords } from './words';

/** Against what is usual at a station; null where that cannot be said. */
type AgainstUsual = 'louder' | 'as-usual' | 'quieter';

/** The nearest other station with data that does not tell the same as the nearest one; undefined where none disagrees. */
function disagreeingStation(facts: LetterFacts): StationEvidence | undefined {
  const nearest = nearestOf(facts);
  if (!nearest || dataState(nearest) !== 'enough') return undefined;
  return othersOf(facts).find((other) => dataState(other) === 'enough' && isOtherStory(nearest, other));
}

/** That a second station tells otherwise, and that the figures do not decide between the two. */
export function secondStationParagraph(facts: LetterFacts): string {
  const other = disagreeingStation(facts);
  const nearest = nearestOf(facts);
  if (!other || !nearest || other.LAeq === null) return '';
  const who = introduced('Our station', other, facts.whereabouts[other.station] ?? null);
  return (
    `${who} measured an average level of ${levelInWords(other.LAeq)} in the same time${comparison(other)}. The two stations do not ` +
    'tell the same story. The figures alone do not decide which of them is closer to what you heard.'
  );
}

function comparison(other: StationEvidence): string {
  const usual = againstUsual(other);
  const limit = isOverLimit(other)
    ? ', and a limit was exceeded there'
    : other.limits.applying > 0
      ? ', and no exceedance is on record there for that time'
      : '';
  if (usual === null) return limit;
  const words = { louder: 'louder than', 'as-usual': 'about as loud as', quieter: 'quieter than' }[usual];
  return `, ${words} usual for that place and hour${limit}`;
}

function isOtherStory(nearest: StationEvidence, other: StationEvidence): boolean {
  const [here, there] = [againstUsual(nearest), againstUsual(other)];
  const differsFromUsual = here !== null && there !== null && here !== there;
  const areJudged = nearest.limits.applying > 0 && other.limits.applying > 0;
  return differsFromUsual || (areJudged && isOverLimit(nearest) !== isOverLimit(other));
}

function isOverLimit({ exceedances }: StationEvidence): boolean {
  return exceedances.some(({ state }) => state === 'standing');
}

function againstUsual({ LAeq, usual }: StationEvidence): AgainstUsual | null {
  if (LAeq === null || usual.low === null || usual.high === null || usual.validWeeks < FEWEST_WEEKS)
    return null;
  if (toTenths(LAeq) > toTenths(usual.high)) return 'louder';
  return toTenths(LAeq) < toTenths(usual.low) ? 'quieter' : 'as-usual';
}
