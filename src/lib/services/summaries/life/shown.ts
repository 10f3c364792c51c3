import { type IssuedRevision, type MonthLife } from '#lib/contracts/summaryLife';
import { type Summary } from '#lib/contracts/summaries';
import { issuedSummary } from '../seal/files';
import { sealedMonth } from './differences';
import { monthLife } from './view';

/** A month as its page shows it. */
export interface ShownMonth {
  life: MonthLife;
  /** The revision that is shown; null: the draft as of now. */
  revision: IssuedRevision | null;
  /** Its sealed figures; null: to be computed. */
  summary: Omit<Summary, 'status'> | null;
}

/**
 * A month’s issued revision by the number asked for, or the latest; where nothing is issued, the draft. Null for a revision that was not issued.
 * @throws {SealBroken} for one whose stored figures do not hold: they are not shown.
 */
export async function shownMonth(
  networkId: number,
  month: string,
  asked: string | null,
): Promise<ShownMonth | null> {
  const life = await monthLife(networkId, month);
  const revision =
    asked === null
      ? (life.revisions[0] ?? null)
      : life.revisions.find((one) => String(one.revision) === asked);
  if (revision === undefined) return null;
  const issued = revision && (await issuedSummary(networkId, month, revision.revision));
  if (!issued) return { life, revision: null, summary: null };
  const { doc } = await sealedMonth(issued.row);
  return { life, revision, summary: doc };
}
