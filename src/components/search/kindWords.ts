import type { HitKind } from '#lib/contracts/search';

/** What kind of thing was found, in a word. */
export const KIND_WORDS: Record<HitKind, string> = {
  page: 'page',
  station: 'station',
  limit: 'limit',
  complaint: 'complaint',
  month: 'month',
};
