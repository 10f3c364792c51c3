import type { LetterFacts } from './facts';
import { renderLetter } from './renderLetter';

export type { LetterFacts } from './facts';

/**
 * The letter of a network that has no template of its own: what was measured at the nearest station in that very time, how far it
 * speaks for the place, compared with the same place at the same hours of the weeks before, limits, tones. It never claims
 * more than the data: without data it says so, and below the minimum coverage nothing is compared. Another station is told where
 * the nearest one lacks data, or tells otherwise.
 */
export const STANDARD_LETTER = [
  'Dear {{name}},',
  '{{opening}}',
  '{{clock-change}}',
  '{{measured}}',
  '{{representative}}',
  '{{compared}}',
  '{{limits}}',
  '{{tones}}',
  '{{second-station}}',
  '{{elsewhere}}',
  '{{caution}}',
  '{{again}}',
  'Yours sincerely,\n{{signed-by}}\n{{network}}',
].join('\n\n');

/** The standard letter on some facts. */
export function draftReply(facts: LetterFacts): string {
  return renderLetter(STANDARD_LETTER, facts);
}
