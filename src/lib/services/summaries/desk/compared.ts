import { listSettings } from '#db/queries/networks';
import { formatInstantUtc } from '#lib/contracts/common';
import { type TrendMonth } from '#lib/contracts/summaryDesk';
import { monthSpan } from '../monthSpan';

/** Two months to compare: those asked for, else the latest with the same month a year before, or with the one before it. */
export async function comparedMonths(
  networkId: number,
  months: readonly TrendMonth[],
  asked: { first: string | null; second: string | null },
): Promise<{
  first: TrendMonth | null;
  second: TrendMonth | null;
  /** The query of each month’s period. */
  periods: ReadonlyMap<string, string>;
}> {
  const timeline = await listSettings(networkId);
  const of = (month: string | null) => months.find((one) => one.month === month) ?? null;
  const second = of(asked.second) ?? months.at(-1) ?? null;
  const first = of(asked.first) ?? (second && (of(yearBefore(second.month)) ?? before(months, second)));
  const periods = new Map(
    months.map(({ month }) => {
      const { fromSec, toSec } = monthSpan(month, timeline);
      return [month, `from=${formatInstantUtc(fromSec)}&to=${formatInstantUtc(toSec)}`];
    }),
  );
  return { first, second, periods };
}

const yearBefore = (month: string) => `${Number(month.slice(0, 4)) - 1}${month.slice(4)}`;

function before(months: readonly TrendMonth[], { month }: TrendMonth): TrendMonth | null {
  return months.filter((one) => one.month < month).at(-1) ?? null;
}
