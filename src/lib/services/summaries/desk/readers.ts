import { listIssuedHeads, type IssuedHead } from '#db/queries/issuedSummaries';
import { findReader, setTold, setVisit } from '#db/queries/summaryReaders';

const SAME_VISIT_MS = 30 * 60_000;

interface Reader {
  networkId: number;
  userId: string;
}

/** Whether a person is told of issued months: as the person said, else regulators are. */
export async function isTold(reader: Reader, isRegulator: boolean): Promise<boolean> {
  return (await findReader(reader)).isTold ?? isRegulator;
}

export function chooseTold(reader: Reader, isTold: boolean): Promise<void> {
  return setTold(reader, isTold);
}

/**
 * Notes that a person looks at a network’s months, and answers what was issued since the visit before; null: there was none. Looks within
 * half an hour are one visit, so that what is new does not go with the next page.
 */
export async function visit(reader: Reader, now: Date): Promise<IssuedHead[] | null> {
  const { visitedAt, previousVisitAt } = await findReader(reader);
  const isSameVisit = visitedAt !== null && now.getTime() - visitedAt.getTime() < SAME_VISIT_MS;
  const since = isSameVisit ? previousVisitAt : visitedAt;
  await setVisit(reader, { visitedAt: now, previousVisitAt: since });
  if (since === null) return null;
  return (await listIssuedHeads(reader.networkId)).filter(({ issuedAt }) => issuedAt > since);
}

/** What was issued since a person’s last visit, without making one; everything where there was none. */
export async function issuedSinceVisit(reader: Reader): Promise<IssuedHead[]> {
  const { visitedAt } = await findReader(reader);
  const heads = await listIssuedHeads(reader.networkId);
  return visitedAt === null ? heads : heads.filter(({ issuedAt }) => issuedAt > visitedAt);
}
