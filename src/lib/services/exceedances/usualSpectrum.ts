import { listSettings, pickSettings, type NetworkSettings } from '#db/queries/networks';
import type { StationRow } from '#db/queries/stations';
import type { Band } from '#lib/acoustics/bands';
import { periodFigures } from '../levels/figures';
import { quantile } from '../levels/quantile';
import type { Span } from '../levels/spans';
import { weeksBefore } from '../levels/usual';

/** Median and 10–90 % range, dB; null where no week before had a level. */
export interface UsualLevel {
  medianDb: number | null;
  lowDb: number | null;
  highDb: number | null;
}

/** What is usual for a window: LAeq and each band over the same weekday and clock window in the weeks before. */
export interface UsualSpectrum {
  weeks: number;
  /** How many of these weeks had enough valid data; only they count. */
  validWeeks: number;
  laeq: UsualLevel;
  /** Beside the bands that were asked for. */
  bands: UsualLevel[];
}

const WEEKS = 8;

/** The usual LAeq and band levels of a window at a station. */
export async function usualSpectrum(
  station: StationRow,
  window: Span,
  bands: readonly Band[],
  timeline?: NetworkSettings[],
): Promise<UsualSpectrum> {
  const settings = timeline ?? (await listSettings(station.networkId));
  const { timeZone } = pickSettings(settings, window.fromSec);
  const laeqDb: (number | null)[] = [];
  const bandsDb: (number | null)[][] = [];
  for (let week = 1; week <= WEEKS; week += 1) {
    const span = weeksBefore(window, week, timeZone);
    const { levels, meetsMinimum } = await periodFigures({ station, timeline: settings, ...span });
    if (!meetsMinimum) continue;
    const { bandFraction } = levels.sums;
    laeqDb.push(levels.laeqDb());
    bandsDb.push(
      bands.map(({ fraction, index }) => (fraction === bandFraction ? levels.bandLeqDb(index) : null)),
    );
  }
  return {
    weeks: WEEKS,
    validWeeks: laeqDb.length,
    laeq: usualOf(laeqDb),
    bands: bands.map((_, at) => usualOf(bandsDb.map((levels) => levels[at] ?? null))),
  };
}

function usualOf(levelsDb: readonly (number | null)[]): UsualLevel {
  const held = levelsDb.filter((level) => level !== null);
  return { medianDb: quantile(held, 0.5), lowDb: quantile(held, 0.1), highDb: quantile(held, 0.9) };
}
