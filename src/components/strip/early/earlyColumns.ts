import { decodeColumns } from '../model/decodeColumns';
import { type StripColumns } from '../model/stripColumns';

declare global {
  interface Window {
    /** Answers that the page has asked for before its scripts were there, by address. */
    earlyAnswers?: Record<string, Promise<Response> | undefined>;
  }
}

const asked = new Map<string, Promise<StripColumns | undefined>>();
const there = new Map<string, StripColumns>();

/** Columns that the page asked for early; undefined where it did not ask, or got nothing of use. */
export function earlyColumns(url: string): Promise<StripColumns | undefined> {
  const answer = window.earlyAnswers?.[url];
  if (answer) {
    delete window.earlyAnswers?.[url];
    asked.set(url, read(url, answer));
  }
  return asked.get(url) ?? Promise.resolve(undefined);
}

async function read(url: string, answer: Promise<Response>): Promise<StripColumns | undefined> {
  try {
    const response = await answer;
    if (!response.ok) return undefined;
    const columns = decodeColumns(await response.arrayBuffer());
    there.set(url, columns);
    return columns;
  } catch {
    // Whoever needs them asks again, and is told why there are none.
    return undefined;
  }
}

/** Columns that have come early, at once, and once only: who needs them again later asks for what is true then. */
export function takeColumnsThere(url: string): StripColumns | undefined {
  const columns = there.get(url);
  if (columns) forgetEarlyColumns(url);
  return columns;
}

/** They are taken. */
export function forgetEarlyColumns(url: string): void {
  asked.delete(url);
  there.delete(url);
}
