import { listSettings, type NetworkRow } from '#db/queries/networks';
import { listStations } from '#db/queries/stations';
import { type MonthState } from '#lib/contracts/summaries';
import { type MonthLife, type SummaryCheck } from '#lib/contracts/summaryLife';
import { monthSpan, type MonthSpan } from '../monthSpan';
import { checksOfMonth } from './checks';
import { monthComments, type ShownComment } from './comments';
import { monthStandings } from './states';
import { monthLife } from './view';

/** A month as whoever reviews it sees it. */
export interface MonthReview {
  life: MonthLife;
  /** Empty where nothing is being made. */
  checks: SummaryCheck[];
  comments: ShownComment[];
  span: MonthSpan;
  state: MonthState;
  /** How many stations a computation goes through. */
  stations: number;
}

export async function reviewOf(
  network: NetworkRow,
  month: string,
  userId: string,
  now: Date,
): Promise<MonthReview> {
  const span = monthSpan(month, await listSettings(network.id));
  const [life, comments, standingOf, stations] = await Promise.all([
    monthLife(network.id, month),
    monthComments(network.id, month, userId),
    monthStandings(network.id),
    listStations(network.id),
  ]);
  const checks = life.draft ? await checksOfMonth(network, month) : [];
  const isOver = now.getTime() / 1000 >= Math.max(span.toSec, span.lastNightEndSec);
  const { state } = standingOf(month, isOver);
  return { life, checks, comments, span, state, stations: stations.length };
}
