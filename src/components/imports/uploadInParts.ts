/** How an upload goes on, for showing it. */
export interface UploadProgress {
  sentBytes: number;
  wholeBytes: number;
  /** Seconds until the next attempt after a break; null while it goes on. */
  waitSec: number | null;
}

export interface PartsUpload {
  /** Address of the network's uploads. */
  base: string;
  station: string;
  file: File;
  signal: AbortSignal;
  onProgress(progress: UploadProgress): void;
}

/** What the browser gives; others in tests. */
export interface Means {
  ask(address: string, request: RequestInit): Promise<Response>;
  waitMs(ms: number, signal: AbortSignal): Promise<void>;
}

export const PART_BYTES = 2 * 1024 * 1024;
const FIRST_WAIT_SEC = 1;
const LONGEST_WAIT_SEC = 60;
const MOST_WRONG_PLACES = 5;

/** The server does not take the file; the message says why. */
export class UploadRefused extends Error {}

/**
 * Uploads a file part by part. It begins where an earlier attempt with the same file ended, and after every break it waits, longer from
 * time to time, and goes on. @returns the number of the import. @throws {UploadRefused}; when `signal` aborts, its reason.
 */
export async function uploadInParts(upload: PartsUpload, means: Means): Promise<number> {
  const { base, file, station, onProgress } = upload;
  const asJson = (body: unknown): RequestInit => ({
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify(body),
  });
  const progress = { sentBytes: 0, wholeBytes: file.size, waitSec: null };
  const patiently = (address: string, request: RequestInit) =>
    answerTo(address, request, upload, means, (waitSec) => onProgress({ ...progress, waitSec }));
  const asked = { station, name: file.name, bytes: file.size, mark: markOf(file) };
  const begun = await patiently(base, asJson(asked));
  const { id, offset } = (await begun.json()).upload as { id: number; offset: number };
  progress.sentBytes = offset;
  for (let wrongPlaces = 0; progress.sentBytes < file.size;) {
    onProgress({ ...progress });
    const answer = await patiently(`${base}/${id}/content`, partOf(file, progress.sentBytes));
    const told = (await answer.json()) as { upload?: { offset: number }; offset?: number };
    wrongPlaces = answer.ok ? 0 : wrongPlaces + 1;
    const goesOnAt = told.upload?.offset ?? told.offset;
    if (goesOnAt === undefined || wrongPlaces > MOST_WRONG_PLACES) {
      throw new UploadRefused('The parts do not fit together. Give the upload up below and begin anew.');
    }
    progress.sentBytes = goesOnAt;
  }
  onProgress({ ...progress });
  const finished = await patiently(`${base}/${id}/finish`, asJson({}));
  if (!finished.ok) throw new UploadRefused(await wordsOf(finished));
  return ((await finished.json()) as { import: { id: number } }).import.id;
}

/** By which the server finds the upload of this file again, after the page was left too. */
function markOf({ name, size, lastModified }: File): string {
  return `${size} ${lastModified} ${name}`.slice(0, 200);
}

function partOf(file: File, first: number): RequestInit {
  const end = Math.min(file.size, first + PART_BYTES);
  return {
    method: 'PUT',
    headers: {
      'Content-Type': 'application/octet-stream',
      'Content-Range': `bytes ${first}-${end - 1}/${file.size}`,
    },
    body: file.slice(first, end),
  };
}

/** Asks until there is an answer that will not change by waiting: success, or 409, which says where to go on. */
async function answerTo(
  address: string,
  request: RequestInit,
  { signal }: PartsUpload,
  { ask, waitMs }: Means,
  onWait: (waitSec: number) => void,
): Promise<Response> {
  for (let failures = 0; ; failures += 1) {
    signal.throwIfAborted();
    const answer = await ask(address, { ...request, signal }).catch(() => null);
    signal.throwIfAborted();
    if (answer && (answer.ok || answer.status === 409)) return answer;
    if (answer && answer.status < 500 && answer.status !== 429 && answer.status !== 408) {
      throw new UploadRefused(await wordsOf(answer));
    }
    const backOffSec = Math.min(LONGEST_WAIT_SEC, FIRST_WAIT_SEC * 2 ** failures);
    const waitSec = Math.max(backOffSec, Number(answer?.headers.get('Retry-After') ?? 0) || 0);
    onWait(waitSec);
    await waitMs(waitSec * 1000, signal);
  }
}

async function wordsOf(answer: Response): Promise<string> {
  if (answer.status === 401)
    return 'You are no longer signed in. Sign in, then choose the same file again: it goes on.';
  const problem = (await answer.json().catch(() => ({}))) as { detail?: string; title?: string };
  return problem.detail ?? problem.title ?? `The server answered ${answer.status}.`;
}
