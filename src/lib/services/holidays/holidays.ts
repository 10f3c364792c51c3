import { appendAudit } from '#db/queries/audit';
import { inTransaction, type Connection } from '#db/queries/connection';
import { listHolidays, replaceHolidays, type Holiday } from '#db/queries/holidays';
import { listLimitVersions } from '#db/queries/limits';
import { settingsAt } from '#db/queries/networks';
import { MOST_DAYS_BACK } from '#lib/contracts/limits';
import type { Holidays } from '#lib/contracts/holidays';
import { addDays, startOfDaySec } from '#lib/time/zone';
import { pendLimit } from '../limits/pendLimit';

/** Named dates of a network, in order of time. */
export async function readHolidays(networkId: number): Promise<Holidays> {
  return { items: await listHolidays(networkId) };
}

/**
 * Puts a list of named dates in the place of the one before. Limits that heed holidays have their windows judged anew from the first
 * changed date on, as far back as a limit may be set.
 */
export async function changeHolidays(
  { networkId, userId }: { networkId: number; userId: string },
  { items }: Holidays,
): Promise<Holidays> {
  return inTransaction(
    async (transaction) => {
      const before = await listHolidays(networkId, transaction);
      const { added, removed } = changesOf(before, items);
      if (added.length + removed.length === 0) return { items: before };
      await replaceHolidays(networkId, items, userId, transaction);
      const [firstDate = ''] = [...added, ...removed].map(({ date }) => date).sort();
      await pendHeeding(networkId, firstDate, transaction);
      const detail = { added, removed };
      await appendAudit(
        { userId, networkId, action: 'holidays.change', subject: `network ${networkId}`, detail },
        transaction,
      );
      return { items: await listHolidays(networkId, transaction) };
    },
    { isolationLevel: 'read committed' },
  );
}

/** What is in one list and not in the other; another name is a change of both. */
function changesOf(before: readonly Holiday[], after: readonly Holiday[]) {
  const keyOf = ({ date, name }: Holiday) => `${date} ${name}`;
  const without = (list: readonly Holiday[], other: readonly Holiday[]) => {
    const keys = new Set(other.map(keyOf));
    return list.filter((one) => !keys.has(keyOf(one)));
  };
  return { added: without(after, before), removed: without(before, after) };
}

async function pendHeeding(networkId: number, firstDate: string, transaction: Connection): Promise<void> {
  const nowSec = Math.floor(Date.now() / 1000);
  const { timeZone } = await settingsAt(networkId, nowSec, transaction);
  const fromSec = Math.max(startOfDaySec(addDays(firstDate, -1), timeZone), nowSec - MOST_DAYS_BACK * 86_400);
  const heeding = (await listLimitVersions(networkId, transaction)).filter(
    ({ holidays }) => holidays !== 'as-weekday',
  );
  for (const limitId of new Set(heeding.map((version) => version.limitId)))
    await pendLimit(networkId, limitId, fromSec, transaction);
}
