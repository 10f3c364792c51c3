/** What the form that redirected here did, by the word in `done`; null where nothing was done, or the word is not one of them. */
export function doneWords(url: URL, words: Readonly<Record<string, string>>): string | null {
  const done = url.searchParams.get('done') ?? '';
  return Object.hasOwn(words, done) ? (words[done] ?? null) : null;
}
