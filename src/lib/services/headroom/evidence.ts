import { pool, type Connection } from '#db/queries/connection';
import type { NetworkSettings } from '#db/queries/networks';
import { listLatest } from '#db/queries/stationLatest';
import type { StationRow } from '#db/queries/stations';
import type { WindRule } from '#lib/acoustics/windRule';
import { currentSums } from '#lib/services/levels/currentSums';
import type { Span } from '#lib/services/levels/spans';
import { usualFor } from '#lib/services/levels/usual';
import { QUARTER_SEC, quarterAt } from '#lib/time/quarters';
import { sumsInWind, type SumsInWind } from './sumsInWind';

/** What is read of a station to tell its headroom: each thing once, however many limits ask for it. */
export class HeadroomEvidence {
  readonly #sums = new Map<string, Promise<SumsInWind>>();
  readonly #usual = new Map<string, Promise<number | null>>();

  private constructor(
    readonly station: StationRow,
    readonly timeline: NetworkSettings[],
    readonly nowSec: number,
    /** End of the newest interval, not after now; null without any. */
    readonly newestSec: number | null,
    private readonly conn: Connection,
  ) {}

  static async read(
    station: StationRow,
    timeline: NetworkSettings[],
    nowSec: number,
    conn: Connection = pool(),
  ): Promise<HeadroomEvidence> {
    const latest = (await listLatest(station.networkId, conn)).find(
      ({ stationId }) => stationId === station.id,
    );
    const newestSec = latest ? Math.min(nowSec, latest.startSec + latest.durationSec) : null;
    return new HeadroomEvidence(station, timeline, nowSec, newestSec, conn);
  }

  /** Current sums of a stretch of time, of the intervals that count for a limit with this wind rule. */
  sums(span: Span, wind: WindRule | null): Promise<SumsInWind> {
    const source = { station: this.station, timeline: this.timeline, validity: 'rules' as const, wind };
    return once(this.#sums, keyOf(span, wind), async () => {
      if (wind) return sumsInWind(source, span, this.conn);
      const { sums } = await currentSums(source, span, { bandClasses: false }, this.conn);
      return { sums, wind: null };
    });
  }

  /** Sums of the 15 minutes before the newest data; null where these are not of the last 15 minutes. */
  async recentSums(wind: WindRule | null): Promise<SumsInWind | null> {
    const { newestSec } = this;
    if (newestSec === null || this.nowSec - newestSec > QUARTER_SEC) return null;
    return this.sums({ fromSec: newestSec - QUARTER_SEC, toSec: newestSec }, wind);
  }

  /** The loud end of what is usual for a rest, LAeq in dB; from the beginning of its quarter-hour, which is read at once. */
  usualHighDb({ fromSec, toSec }: Span): Promise<number | null> {
    const { station, timeline } = this;
    const window = { fromSec: quarterAt(fromSec), toSec };
    return once(this.#usual, keyOf(window, null), async () => {
      const { highDb } = await usualFor({ station, timeline, window }, this.conn);
      return highDb;
    });
  }
}

function keyOf({ fromSec, toSec }: Span, wind: WindRule | null): string {
  return `${fromSec}:${toSec}:${JSON.stringify(wind)}`;
}

function once<T>(known: Map<string, Promise<T>>, key: string, read: () => Promise<T>): Promise<T> {
  const before = known.get(key);
  if (before) return before;
  const answer = read();
  known.set(key, answer);
  return answer;
}
