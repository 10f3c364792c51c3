import { bandAt, bandLabel } from '#lib/acoustics/bands';
import { standingOut } from '#lib/acoustics/standingOut';
import { averagedNeighbourTones, thirdsTenthsOfDb } from '#lib/acoustics/tonality';
import { type PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { type Tonality, type ToneSentence } from '#lib/contracts/figureSheet';
import { isTone, standingOutWords } from '#lib/format/standingOut';
import { notAssessableWords, toneWords } from '#lib/format/tones';
import { type SheetSource } from './source';
import { fractionOf, stationBands } from './stationBands';

/** What the tonal methods say about the period's mean spectrum, and how often its single blocks had a tone. */
export function tonalityOf(
  { station }: Pick<SheetSource, 'station'>,
  levels: PeriodAccumulator,
  blocks: Tonality['blocks'],
): Tonality {
  if (levels.sums.validSec === 0) {
    return { notAssessable: 'There are no valid data in this period.', tones: [], standingOut: [], blocks };
  }
  const fraction = fractionOf(station, levels);
  const bands = stationBands(station, levels);
  const levelsDb = bands.map(({ index }) => levels.bandLeqDb(index));
  const averagedSec = levels.sums.validSec;
  const { tonality, ranges } = standingOut({ fraction, bands, levelsDb, averagedSec });
  const others = ranges
    .filter((range) => !isTone(range))
    .map((range) => `${standingOutWords(range, fraction)}.`);
  if (tonality.kind === 'not-assessable') {
    return { notAssessable: notAssessableWords(tonality.reason), tones: [], standingOut: others, blocks };
  }
  const found = tonality.findings.map((finding): ToneSentence => {
    const { band, rest } = toneWords(finding);
    return { method: finding.method, words: `${band} ${rest}.` };
  });
  const averaged = averagedNeighbourTones(thirdsTenthsOfDb(levelsDb, bands)).map(
    ({ lowerIndex, excessTenths }): ToneSentence => ({
      method: 'averaged-neighbours',
      words: `${bandLabel(bandAt(3, lowerIndex))} band is ${(excessTenths / 10).toFixed(1)} dB above the mean of both neighbours.`,
    }),
  );
  return { notAssessable: null, tones: [...found, ...averaged], standingOut: others, blocks };
}
