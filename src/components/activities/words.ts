/** Field → what its label says, for the summary of errors. */
export const ACTIVITY_LABELS = {
  kind: 'What the site did',
  place: 'Where',
  from: 'From',
  to: 'To',
  note: 'Note',
  reason: 'Reason',
  file: 'File',
} as const;
