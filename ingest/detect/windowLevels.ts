import type { Connection } from '#db/queries/connection';
import type { QuarterHour } from '#db/queries/quarterHours';
import { PeriodAccumulator } from '#lib/acoustics/periodStatistics';
import { QUARTER_SEC } from '#lib/time/quarters';
import { currentQuarters } from '#lib/services/levels/currentQuarters';
import type { LevelSource } from '#lib/services/levels/intervalSums';
import type { Span } from '#lib/services/levels/spans';

const READ_AHEAD_SEC = 2 * 86_400;

/** Sums of a station's windows, asked for in order of time: quarter-hours are read two days at once, each about once. */
export class WindowLevels {
  private quarters: QuarterHour[] = [];
  private read: Span = { fromSec: 0, toSec: 0 };

  constructor(
    private readonly source: LevelSource,
    private readonly conn: Connection,
  ) {}

  /** Sums of a window of whole quarter-hours, current. */
  async of(window: Span): Promise<PeriodAccumulator> {
    if (window.fromSec < this.read.fromSec || window.toSec > this.read.toSec) await this.readFrom(window);
    const levels = new PeriodAccumulator();
    for (const { startSec, sums } of this.quarters) {
      if (startSec >= window.fromSec && startSec + QUARTER_SEC <= window.toSec) levels.merge({ sums });
    }
    return levels;
  }

  private async readFrom({ fromSec, toSec }: Span): Promise<void> {
    this.read = { fromSec, toSec: Math.max(toSec, fromSec + READ_AHEAD_SEC) };
    this.quarters = await currentQuarters(this.source, this.read, { bands: true }, this.conn);
  }
}
