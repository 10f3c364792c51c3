import type { ComplaintKind } from '#lib/contracts/complaints';

/** An internal note as it is shown. */
export interface NoteLine {
  id: number;
  text: string;
  author: string;
  at: Date;
}

/** Something that was done, as it is shown; without a name it was nobody who signed in. */
export interface HistoryLine {
  id: number;
  at: Date;
  by: string | null;
  what: string;
}

/** Another complaint, as a link or a choice. */
export interface OtherLine {
  reference: string;
  kind: ComplaintKind;
  fromSec: number;
  toSec: number;
}
