import type { Connection } from '#db/queries/connection';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { mergeWind, noWind, type WindowWind } from '#lib/acoustics/windRule';
import type { PeriodSums } from '#lib/acoustics/periodSums';
import { QUARTER_SEC } from '#lib/time/quarters';
import { currentQuarters } from '../levels/currentQuarters';
import type { LevelSource } from '../levels/intervalSums';
import type { Span } from '../levels/spans';
import { sumsByGrain } from './grains';

const READ_AHEAD_SEC = 2 * 86_400;

/** A stretch of time and what was measured in it, in order of time. */
interface Part {
  startSec: number;
  sums: PeriodSums;
  wind?: WindowWind | undefined;
}

interface Read extends Span {
  parts: Part[];
}

const NOTHING_READ: Read = { fromSec: 0, toSec: 0, parts: [] };

/**
 * Sums of a station's windows, asked for in order of time: parts are read two days at once, each about once. Windows of whole
 * quarter-hours are made of these, others, and those of a source that goes by the wind, of fives of minutes from the intervals.
 */
export class WindowLevels {
  #quarters = NOTHING_READ;
  #grains = NOTHING_READ;

  constructor(
    private readonly source: LevelSource,
    private readonly conn: Connection,
  ) {}

  /** Sums of a window of whole fives of minutes, current. */
  async of(window: Span): Promise<PeriodAccumulator> {
    const levels = new PeriodAccumulator();
    for (const { startSec, sums } of await this.partsOf(window)) {
      if (startSec >= window.toSec) break;
      if (startSec >= window.fromSec) levels.merge({ sums });
    }
    return levels;
  }

  /** Wind of all that was measured in a window, of a source that goes by the wind. */
  async windOf(window: Span): Promise<WindowWind> {
    const wind = noWind();
    for (const part of await this.partsOf(window)) {
      if (part.startSec >= window.toSec) break;
      if (part.startSec >= window.fromSec && part.wind) mergeWind(wind, part.wind);
    }
    return wind;
  }

  private async partsOf(window: Span): Promise<Part[]> {
    const span = { fromSec: window.fromSec, toSec: Math.max(window.toSec, window.fromSec + READ_AHEAD_SEC) };
    const isOfQuarters =
      !this.source.wind && window.fromSec % QUARTER_SEC === 0 && window.toSec % QUARTER_SEC === 0;
    if (isOfQuarters) {
      if (!isWithin(window, this.#quarters)) {
        const parts = await currentQuarters(this.source, span, { bands: true }, this.conn);
        this.#quarters = { ...span, parts };
      }
      return this.#quarters.parts;
    }
    if (!isWithin(window, this.#grains))
      this.#grains = { ...span, parts: await sumsByGrain(this.source, span, this.conn) };
    return this.#grains.parts;
  }
}

function isWithin(window: Span, read: Span): boolean {
  return read.fromSec <= window.fromSec && window.toSec <= read.toSec;
}
