import { type TroubleRow } from '#db/queries/health';
import { formatInstantUtc } from '#lib/contracts/common';
import { TROUBLE_KINDS, type Trouble, type TroubleKind } from '#lib/contracts/health';
import { troubleAdvice, troubleWhat } from './troubleWords';

/** The kind of a stored trouble. */
export function kindOf({ kind }: Pick<TroubleRow, 'kind'>): TroubleKind {
  const known = TROUBLE_KINDS.find((one) => one === kind);
  if (!known) throw new Error(`There is no trouble of kind ${kind}.`);
  return known;
}

/** A trouble as the interface gives it. */
export function troubleJson(row: TroubleRow): Trouble {
  const kind = kindOf(row);
  return {
    id: row.id,
    station: row.stationCode,
    stationName: row.stationName,
    kind,
    since: formatInstantUtc(row.beginsAtSec),
    until: row.endsAtSec === null ? null : formatInstantUtc(row.endsAtSec),
    what: troubleWhat({ ...row, kind }),
    advice: troubleAdvice(kind),
  };
}

/** Worst first: by kind, then by how long. */
export function worstFirst(a: Trouble, b: Trouble): number {
  const rank = ({ kind }: Trouble) => TROUBLE_KINDS.indexOf(kind);
  return rank(a) - rank(b) || (a.since < b.since ? -1 : a.since > b.since ? 1 : 0);
}
