/** The words of a search, without case, accents and whatever only divides them. */
export function wordsOf(text: string): string[] {
  return folded(text)
    .split(/[^\p{L}\p{N}]+/u)
    .filter(Boolean);
}

/**
 * How well words match a label and further terms: 0 not at all, else more for words at the beginning of the label, then of any
 * of its words, then of any term. Every word must begin some word, or stand within one of the label’s from two characters on.
 */
export function matchScore(words: readonly string[], label: string, terms = ''): number {
  const labelWords = wordsOf(label);
  const termWords = wordsOf(terms);
  let score = 1;
  for (const [at, word] of words.entries()) {
    const points = pointsOf(word, labelWords, termWords, at === 0);
    if (points === 0) return 0;
    score += points;
  }
  return score;
}

function pointsOf(
  word: string,
  labelWords: readonly string[],
  termWords: readonly string[],
  isFirst: boolean,
): number {
  if (labelWords.includes(word)) return isFirst && labelWords[0] === word ? 8 : 6;
  if (isFirst && labelWords[0]?.startsWith(word)) return 5;
  if (labelWords.some((one) => one.startsWith(word))) return 4;
  if (termWords.some((one) => one.startsWith(word))) return 2;
  return word.length > 1 && labelWords.some((one) => one.includes(word)) ? 1 : 0;
}

function folded(text: string): string {
  return text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();
}
