import { listHealthSettings } from '#db/queries/healthSettings';
import { selectOffsets } from '#db/queries/clockOffsets';
import { selectStandingShifts } from '#db/queries/clockShifts';
import { type StationRow } from '#db/queries/stations';
import { type ClockOffsets } from '#lib/contracts/clockShifts';
import { formatInstantUtc } from '#lib/contracts/common';
import { parseUrlInstant } from '#lib/time/urlPeriod';
import { thresholdsFor } from '../health/thresholds';
import { type Span } from '../levels/spans';
import { suggestedEpisodes, suggestedShiftSec, type SuggestedEpisode } from './offsets';

const SHOWN_SEC = 31 * 86_400;

/** What the page of a station's clock shows of what was measured. */
export interface ClockView {
  period: Span;
  offsets: ClockOffsets['items'];
  boundSec: number;
  episodes: SuggestedEpisode[];
  /** For the period that was typed; null: none was, or nothing was measured in it. */
  suggestedSec: number | null;
}

/** Offsets of the last 31 days, and what they suggest. */
export async function clockView(
  { id, networkId }: StationRow,
  typed: { from: string; to: string },
  zone: string,
  nowSec: number,
): Promise<ClockView> {
  const period = { fromSec: nowSec - SHOWN_SEC, toSec: nowSec };
  const [offsets, settings, shifts] = await Promise.all([
    selectOffsets(id, period.fromSec, period.toSec),
    listHealthSettings(networkId),
    selectStandingShifts(id),
  ]);
  const boundSec = thresholdsFor(id, settings).mostClockOffSeconds;
  const [fromSec, toSec] = [parseUrlInstant(typed.from, zone), parseUrlInstant(typed.to, zone)];
  return {
    period,
    offsets: offsets.map(({ quarterStartSec, aheadSec }) => ({
      at: formatInstantUtc(quarterStartSec),
      aheadSeconds: aheadSec,
    })),
    boundSec,
    episodes: suggestedEpisodes(offsets, boundSec).filter(
      (episode) => !shifts.some((shift) => shift.fromSec < episode.toSec && shift.toSec > episode.fromSec),
    ),
    suggestedSec: fromSec === null || toSec === null ? null : suggestedShiftSec(offsets, { fromSec, toSec }),
  };
}
