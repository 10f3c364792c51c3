import { actionValuesReached } from '#lib/acoustics/occupational';
import { type IntervalFacts } from '#lib/contracts/figureSheet';
import { type Statistics } from '#lib/contracts/levels';
import { formatDuration } from '#lib/format/durations';

/** What the figures do not show. */
export function cautionsOf(statistics: Statistics, intervals: IntervalFacts | null): string[] {
  return [
    'These are levels at the place of the microphone as installed, not of a source, a dwelling or a person. They hold every sound, ' +
      'whoever made it.',
    ...(statistics.note === null ? [] : [statistics.note]),
    ...occupational(statistics),
    ...(statistics.coverage < 1
      ? ['Time without valid data is not silence: what happened then is not in any figure here.']
      : []),
    ...(intervals && intervals.underrangeSec > 0
      ? [
          `${formatDuration(intervals.underrangeSec)} of the valid time is flagged underrange: the true levels then were lower than ` +
            'measured.',
        ]
      : []),
    ...(intervals && intervals.computedSec > 0
      ? [`In ${formatDuration(intervals.computedSec)} of the valid time LAeq was computed from the bands.`]
      : []),
    'A tone that a third shows has a range of frequencies, not a frequency. Audibility takes a narrow-band analysis made elsewhere.',
    'They support a professional judgement and do not replace one: local rules, permits and the competent authority decide.',
  ];
}

/** Occupational values are for a worker's ear over a shift; reaching one is a reason to say so, and no more. */
function occupational({ LAeq, LCpeak }: Statistics): string[] {
  const reached = actionValuesReached({ laeqDb: LAeq, lcpeakDb: LCpeak });
  if (reached.length === 0) {
    return [
      'Occupational action values (80 and 85 dB(A) over 8 h, 135 and 137 dB(C) peak, Directive 2003/10/EC) hold for a person’s ear ' +
        'over a shift and do not apply to environmental measurements; LAeq and LCpeak of this period do not reach them.',
    ];
  }
  const values = reached.map(({ quantity, levelDb, source }) => `${quantity} ${levelDb} dB (${source})`);
  return [
    `The period’s levels reach occupational values: ${values.join(', ')}. They hold for a person’s ear over a shift of 8 h and do not ` +
      'apply to environmental measurements as they are, but whoever works at this place may need hearing protection: ask the local ' +
      'authority.',
  ];
}
