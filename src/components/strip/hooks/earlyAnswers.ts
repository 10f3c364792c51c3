declare global {
  interface Window {
    /** Answers that the page has asked for before its scripts were there, by address. */
    earlyAnswers?: Record<string, Promise<Response> | undefined>;
  }
}

/** The page's own answer to what it asked for early, once; undefined where it did not ask, or got nothing of use. */
export async function takeEarlyAnswer(url: string): Promise<Response | undefined> {
  const early = window.earlyAnswers?.[url];
  if (!early) return undefined;
  delete window.earlyAnswers?.[url];
  const answer = await early.catch(() => undefined);
  return answer?.ok ? answer : undefined;
}
