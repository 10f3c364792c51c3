import { bandSetOf } from '#db/queries/bandSets';
import { inTransaction, isConnectionLost } from '#db/queries/connection';
import { lockStation } from '#db/queries/stations';
import type { TokenStation } from '#db/queries/stationTokens';
import type { Receipt } from '#lib/contracts/intervals';
import { clockRulesFor, possibleStretches } from './clockRules';
import { decide } from './decide';
import type { Envelope } from './envelope';
import { finishPost, type Post, type ReceivingStation } from './finishPost';
import { Gatherer } from './gatherer';
import { readRecordsInParts } from './readRecords';
import { storedAround } from './storedAround';
import { circumstancesOf, StaleStation, takeTogether } from './together';

export { StaleStation };

/** Posts of more intervals gain nothing by sharing a transaction, and would keep the others of it waiting. */
const MOST_SHARED_INTERVALS = 120;

const gatherer = new Gatherer<Post, Receipt>(
  {
    together: (posts) => takeTogether(posts, { isWaiting: false }),
    alone: takeAlone,
    keyOf: ({ station }) => station.id,
    sizeOf: ({ envelope }) => envelope.intervals.length,
    isHopeless: isConnectionLost,
  },
  { groupsAtOnce: 3, mostItems: 64, mostSize: 600 },
);

/**
 * Takes a post of a station: each record is accepted, known already, or refused with a reason and kept in quarantine. When the
 * promise resolves everything accepted and every record kept is durable, with marks for what must be recomputed.
 * A station that is `remembered` by its token costs no question of its own: that it is still so is asked with the rest.
 * @throws {StaleStation} when it is not. Small posts that wait at the same moment share a transaction.
 */
export async function receiveBatch(
  station: ReceivingStation,
  envelope: Envelope,
  now: Date,
  remembered: TokenStation | null = null,
): Promise<Receipt> {
  const { bandIndices, intervals } = envelope;
  const bandSet = await ('problem' in bandIndices
    ? bandIndices
    : bandSetOf(station.bandFraction, bandIndices.indices));
  const read = await readRecordsInParts(intervals, bandSet, now.getTime() / 1000);
  const post = { station, remembered, envelope, now, bandSet, ...read };
  return intervals.length > MOST_SHARED_INTERVALS ? takeAlone(post) : gatherer.take(post);
}

async function takeAlone(post: Post): Promise<Receipt> {
  const [outcome] = await takeTogether([post], { isWaiting: true });
  if (outcome?.kind === 'done') return outcome.answer;
  if (outcome?.kind === 'failed') throw outcome.error;
  return takeThroughShifts(post);
}

/** Takes a post of a station some of whose intervals a shift of the clock puts elsewhere than their monitor says. */
async function takeThroughShifts(post: Post): Promise<Receipt> {
  const { station, candidates, bandSet } = post;
  return inTransaction(async (transaction) => {
    if ('problem' in bandSet) return finishPost(post, null, transaction);
    await lockStation(station.id, transaction);
    const records = candidates.map(({ interval }) => interval);
    const clock = await clockRulesFor(station.id, records, transaction);
    const stored = await storedAround(station.id, possibleStretches(records, clock), transaction);
    const decision = decide(candidates, { ...circumstancesOf(post), stored, bandSet, clock });
    return finishPost(post, decision, transaction);
  });
}
