import type { TroubleKind } from '#lib/contracts/health';

/** Page of a station that shows what a trouble was found by, where there is one. */
export const TROUBLE_PAGES: Partial<Record<TroubleKind, string>> = {
  clock: 'clock',
  drift: 'drift',
  selfcheck: 'drift',
};
