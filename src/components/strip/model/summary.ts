import { NO_LEVEL_CENTI_DB } from '#lib/acoustics/levelRange';
import { gapsOf, type StripPicture } from '../draw/drawStrip';
import { formatDuration } from '#lib/format/durations';
import { formatLevelDb } from '#lib/format/levels';
import { clockWords, dayWords, stretchWords } from './timeWords';
import { spanSec } from './timeView';

/** What the strip shows, in a sentence, for those who do not see it. */
export function stripSummary(stationName: string, { view, zone, pixels, lanes }: StripPicture): string {
  const period = stretchWords(view, zone);
  let low = Infinity;
  let high = -Infinity;
  let highAt = 0;
  pixels.laeqHighCentiDb.forEach((centiDb, px) => {
    if (centiDb === NO_LEVEL_CENTI_DB) return;
    low = Math.min(low, pixels.laeqLowCentiDb[px] ?? centiDb);
    if (centiDb > high) [high, highAt] = [centiDb, px];
  });
  if (low > high) return `${stationName}, ${period}: no data.`;
  const highSec = view.fromSec + (highAt / pixels.widthPx) * spanSec(view);
  const missingSec = gapsOf(lanes).reduce((sum, gap) => sum + gap.toSec - gap.fromSec, 0);
  const missing = missingSec > 0 ? `; ${formatDuration(missingSec)} without data` : '; no gaps';
  return (
    `${stationName}, ${period}: LAeq from ${formatLevelDb(low / 100)} to ${formatLevelDb(high / 100)} dB, ` +
    `loudest about ${dayWords(highSec, zone)} ${clockWords(Math.round(highSec / 60) * 60, zone)}${missing}.`
  );
}
