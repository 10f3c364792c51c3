import { type IssuedRevision, type MonthLife } from '#lib/contracts/summaryLife';
import { type MonthDocument } from '#lib/contracts/monthDocument';
import { issuedSummary } from '../seal/files';
import { SealBroken, sealedMonth } from './differences';
import { monthLife } from './view';

/** A month as its page shows it. */
export interface ShownMonth {
  life: MonthLife;
  /** The revision that is shown; null: the draft as of now. */
  revision: IssuedRevision | null;
  /** Its sealed figures; null: to be computed, or damaged. */
  summary: MonthDocument | null;
  /** Why an issued revision cannot be shown: what is stored of it does not fit its seal. */
  damage: string | null;
}

/**
 * A month’s issued revision by the number asked for, or the latest; where nothing is issued, the draft. Null for a revision that was not issued.
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
  if (!issued) return { life, revision: null, summary: null, damage: null };
  try {
    return { life, revision, summary: (await sealedMonth(issued.row)).doc, damage: null };
  } catch (error) {
    if (!(error instanceof SealBroken)) throw error;
    return { life, revision, summary: null, damage: error.message };
  }
}
