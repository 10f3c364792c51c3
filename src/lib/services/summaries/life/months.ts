import { listSettings, type NetworkRow, type NetworkSettings } from '#db/queries/networks';
import { listStationMonths } from '#db/queries/summaries';
import { type Connection, pool } from '#db/queries/connection';
import { monthSpan, type MonthSpan } from '../monthSpan';
import { summarySettings } from '../template/settings';

const DAY_SEC = 86_400;
/** Months that ended longer ago are drafted by hand only. */
const LATEST_BY_ITSELF_SEC = 62 * DAY_SEC;

export interface ClosingMonth {
  month: string;
  span: MonthSpan;
  /** When it is drafted by itself: after its last night and the days of grace. */
  dueSec: number;
}

/** Months of a network that have data and whose last night is over, latest first. */
export async function closedMonths(
  network: Pick<NetworkRow, 'id'>,
  nowSec: number,
  conn: Connection = pool(),
): Promise<ClosingMonth[]> {
  const timeline = await listSettings(network.id, conn);
  const { graceDays } = await summarySettings(network.id, conn);
  const months = new Set((await listStationMonths(network.id, conn)).map(({ month }) => month));
  return [...months]
    .map((month) => closingOf(month, timeline, graceDays))
    .filter(({ span }) => span.lastNightEndSec <= nowSec && span.toSec <= nowSec);
}

/** Those of them that the worker drafts by itself now. */
export async function dueMonths(network: Pick<NetworkRow, 'id'>, now: Date): Promise<ClosingMonth[]> {
  const nowSec = Math.floor(now.getTime() / 1000);
  const closed = await closedMonths(network, nowSec);
  return closed.filter(({ dueSec }) => dueSec <= nowSec && nowSec < dueSec + LATEST_BY_ITSELF_SEC);
}

function closingOf(month: string, timeline: NetworkSettings[], graceDays: number): ClosingMonth {
  const span = monthSpan(month, timeline);
  return { month, span, dueSec: Math.max(span.toSec, span.lastNightEndSec) + graceDays * DAY_SEC };
}
