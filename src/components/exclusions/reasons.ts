/** Why a period is left out, from a list; own words go after it. */
export const EXCLUSION_REASONS = {
  storm: 'Storm or heavy rain',
  works: 'Works at the station',
  mowing: 'Mowing or gardening beside it',
  visit: 'Somebody worked on the instrument',
  animals: 'Animals at the microphone',
  event: 'An event that has nothing to do with the site',
  fault: 'Fault of the instrument',
  other: 'Something else',
} as const;
export type ExclusionReason = keyof typeof EXCLUSION_REASONS;

export function isExclusionReason(text: string): text is ExclusionReason {
  return Object.hasOwn(EXCLUSION_REASONS, text);
}

/** Room for own words, so that with the listed reason they fit into what is kept. */
export const MOST_DETAIL_CHARACTERS = 400;

/** The reason as it is kept: "Storm or heavy rain: gusts from the south-west"; of something else, own words alone. */
export function reasonWords(reason: ExclusionReason, detail: string): string {
  if (reason === 'other') return detail;
  return detail === '' ? EXCLUSION_REASONS[reason] : `${EXCLUSION_REASONS[reason]}: ${detail}`;
}
