import { appendAudit } from '#db/queries/audit';
import { inTransaction } from '#db/queries/connection';
import { joinInAct, listExclusionsOfAct } from '#db/queries/exclusions';
import { lockStation } from '#db/queries/stations';
import { type BulkExclusion, type Exclusion } from '#lib/contracts/exclusions';
import { formatInstantUtc } from '#lib/contracts/common';
import { done, type Outcome } from '../outcome';
import { exclude } from './add';
import { chosenStations } from './chosenStations';
import { exclusionJson } from './exclusionJson';

/** Leaves a period of several stations out of statistics by one act: at all of them, or at none. */
export async function excludeAtStations(
  { networkId, userId }: { networkId: number; userId: string },
  { stations, from, to, reason }: BulkExclusion,
): Promise<Outcome<Exclusion[]>> {
  const chosen = await chosenStations(networkId, stations);
  if (chosen.kind !== 'done') return chosen;
  const span = { fromSec: from, toSec: to };
  return inTransaction<Outcome<Exclusion[]>>(async (transaction) => {
    // All locks first and by number: two acts never wait for each other, and what others stored before is seen.
    for (const { id } of chosen.value) await lockStation(id, transaction);
    const made: Exclusion[] = [];
    for (const station of chosen.value) {
      made.push(await exclude(station, { networkId, ...span, reason, userId }, transaction));
    }
    if (made.length === 1) return done(made);
    const act = await joinInAct(
      made.map(({ id }) => id),
      transaction,
    );
    await appendAudit(
      {
        userId,
        networkId,
        action: 'exclusion.act',
        subject: `exclusions ${act}`,
        detail: {
          act,
          stations: made.map(({ station }) => station),
          from: formatInstantUtc(from),
          to: formatInstantUtc(to),
          reason,
        },
      },
      transaction,
    );
    return done((await listExclusionsOfAct(networkId, act, transaction)).map(exclusionJson));
  });
}
