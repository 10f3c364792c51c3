import { toTenths } from '#lib/acoustics/rounding';
import { FEWEST_WEEKS, type Usual } from '#lib/contracts/complaintEvidence';
import { weekdaysInWords } from './times';
import { differenceInWords, levelInWords, numberInWords } from './words';

/** The level of the window against the same weekday and hours of the weeks before, at that place. */
export function comparedParagraph(laeqDb: number, usual: Usual, fromSec: number, zone: string): string {
  const weekdays = weekdaysInWords(fromSec, zone);
  const weeks = `the ${numberInWords(usual.weeks)} ${weekdays} before`;
  const { median, low, high } = usual;
  if (median === null || low === null || high === null) {
    return `None of ${weeks} has enough measurements of the same hours, so we cannot say whether this was unusual there.`;
  }
  const among =
    usual.validWeeks === usual.weeks ? `On ${weeks}` : `On ${numberInWords(usual.validWeeks)} of ${weeks}`;
  if (usual.validWeeks < FEWEST_WEEKS) {
    return (
      `${among}, the same hours were measured well enough: the average level there was ${spreadInWords(low, high)}. ` +
      'That is too little to say what is usual.'
    );
  }
  const range =
    `${among}, the average level at the same hours and the same place was mostly ${spreadInWords(low, high)}, ` +
    `half of them below ${levelInWords(median)}. `;
  return (
    range + verdict(toTenths(laeqDb), { low: toTenths(low), median: toTenths(median), high: toTenths(high) })
  );
}

function spreadInWords(low: number, high: number): string {
  return toTenths(low) === toTenths(high)
    ? levelInWords(low)
    : `between ${levelInWords(low).replace(' dB(A)', '')} and ${levelInWords(high)}`;
}

function verdict(level: number, usual: { low: number; median: number; high: number }): string {
  const fromMedian = differenceInWords(level - usual.median);
  if (level > usual.high)
    return `The time reported was louder than usual there, ${fromMedian} above that middle value.`;
  if (level < usual.low)
    return `The time reported was quieter than usual there, ${fromMedian} below that middle value.`;
  return 'The time reported lies within that range: as a whole it was about as loud as usual there.';
}
