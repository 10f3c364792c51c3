import { type QuarantineCode, type ReleaseOutcome, type SettledOutcome } from '#lib/contracts/quarantine';

/** Why a record was refused, for people. */
export const CODE_WORDS: Record<QuarantineCode, string> = {
  malformed: 'Malformed',
  'out-of-range': 'Value out of range',
  'clock-ahead': 'Clock ahead',
  'too-old': 'Too old for the station',
  overlap: 'Overlaps a stored interval',
  conflict: 'Differs from the stored interval',
  'unknown-band': 'Unknown band',
  superseded: 'Was stored, then replaced',
};

export const STATE_WORDS = {
  open: 'Open',
  released: 'Released',
  dismissed: 'Dismissed',
  superseded: 'Superseded',
} as const;

const records = (count: number) => `${count} ${count === 1 ? 'record' : 'records'}`;

/** What a release came to, in a sentence or two. */
export function releaseWords({
  released,
  known,
  refusedCount,
  isMoreLeft,
}: Pick<ReleaseOutcome, 'released' | 'known' | 'refusedCount' | 'isMoreLeft'>): string {
  return [
    `${records(released)} stored.`,
    known > 0 && `${records(known)} said what is stored already.`,
    refusedCount > 0 && `${records(refusedCount)} still refused; they stay open.`,
    isMoreLeft && 'More match: release again for the next ones.',
  ]
    .filter(Boolean)
    .join(' ');
}

/** What a dismissal or its undoing came to. */
export function settledWords(
  done: 'dismissed' | 'reopened',
  { settled, isMoreLeft }: Pick<SettledOutcome, 'settled' | 'isMoreLeft'>,
): string {
  return `${records(settled)} ${done}.${isMoreLeft ? ' More match: do it again for the next ones.' : ''}`;
}
