import { type PlantRow } from '#db/queries/plants';
import { bandAt, bandLabel } from '#lib/acoustics/bands';
import { type LineMatch, type PlantMatch } from '#lib/acoustics/plantMatches';
import { type StandingOutRange } from '#lib/acoustics/standingOut';
import { formatClockTime } from '#lib/contracts/common';
import { formatCoverage } from '#lib/format/levels';
import { lineFormula, lineName, scheduleWords } from '#lib/format/plants';

/** A line that reaches outside the band by more than this part of itself is said to. */
const LEAST_FIT = 0.95;

/**
 * Why a plant is named, without its full stop: "blade-pass of Silo fan, 25 Hz × 4 blades = 100 Hz, inside the 100 Hz third;
 * scheduled Mon–Fri 21:00–06:00".
 */
export function candidateReason(
  plant: PlantRow,
  { matches }: PlantMatch,
  ranges: readonly StandingOutRange[],
  share: number,
): string {
  const lines = matches.map((match, at) => {
    const whose = at === 0 ? ` of ${plant.name}` : '';
    return `${lineName(match.line)}${whose}, ${lineFormula(plant, match.line)}, ${placeOf(match, ranges)}`;
  });
  return `${lines.join('; ')}; ${scheduleOf(plant, share)}`;
}

function placeOf({ rangeAt, fit }: LineMatch, ranges: readonly StandingOutRange[]): string {
  const range = ranges[rangeAt];
  if (!range) throw new RangeError(`There is no range ${rangeAt}.`);
  const label = (index: number) => bandLabel(bandAt(3, index));
  const inside = fit >= LEAST_FIT ? 'inside' : `${formatCoverage(fit)} of it inside`;
  if (range.lowerIndex === range.upperIndex) return `${inside} the ${label(range.lowerIndex)} third`;
  return `${inside} the ${label(range.lowerIndex)} and ${label(range.upperIndex)} thirds`;
}

function scheduleOf({ weekdays, fromMin, toMin }: PlantRow, share: number): string {
  const clock = {
    from: fromMin === null ? null : formatClockTime(fromMin),
    to: toMin === null ? null : formatClockTime(toMin),
  };
  const words = `scheduled ${scheduleWords(weekdays, clock)}`;
  if (share === 0) return `${words}: not in this period`;
  return share === 1 ? words : `${words}: ${formatCoverage(share)} of this period`;
}
