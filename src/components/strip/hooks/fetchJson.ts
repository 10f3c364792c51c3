/** A refusal by the server in its own words. */
export class ServerRefusal extends Error {
  constructor(
    readonly status: number,
    message: string,
  ) {
    super(message);
    this.name = 'ServerRefusal';
  }
}

/**
 * Calls the interface and answers what it sends.
 * @throws {ServerRefusal} with the problem's own words, or plain ones when nothing came back.
 */
export async function fetchAnswer(url: string, init: RequestInit = {}): Promise<Response> {
  let response: Response;
  try {
    response = await fetch(url, init);
  } catch (error) {
    if (init.signal?.aborted) throw error;
    throw new ServerRefusal(0, 'The server cannot be reached. Check the connection and try again.');
  }
  if (!response.ok) throw new ServerRefusal(response.status, await wordsOf(response));
  return response;
}

/** The JSON that a GET answers. @throws {ServerRefusal} */
export async function fetchJson<T>(url: string, signal: AbortSignal): Promise<T> {
  const response = await fetchAnswer(url, { signal, headers: { Accept: 'application/json' } });
  return (await response.json()) as T;
}

/** Sends JSON. @throws {ServerRefusal} */
export async function postJson(url: string, body: unknown): Promise<void> {
  await fetchAnswer(url, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify(body),
  });
}

async function wordsOf(response: Response): Promise<string> {
  if (response.status === 401) return 'You have been signed out. Sign in again, then come back to this page.';
  const fallback = `The server refused this (${response.status}).`;
  try {
    const problem = (await response.json()) as { title?: string; detail?: string };
    return problem.detail ?? problem.title ?? fallback;
  } catch {
    return fallback;
  }
}
