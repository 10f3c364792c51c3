import path from 'node:path';
import { Worker } from 'node:worker_threads';
import { type FromThread, type ToThread } from './searchMessages';
import { type SearchProgress, type SearchResult, type SearchTask } from './searchTask';

/** Searches that may wait for the one that runs; more are refused. */
const MOST_WAITING = 4;
/** A thread without work ends, and its memory and connections with it. */
const IDLE_MS = 120_000;
/** From the root that web, worker and tests run in; pages are bundled elsewhere. */
const THREAD_FILE = path.resolve('src/lib/services/spectra/startThread.mjs');

/** Too many searches wait already: try again in a few seconds. */
export class SearchesFull extends Error {}
/** Who asked has gone. */
export class SearchCancelled extends Error {}

export interface SearchListener {
  onProgress?: ((progress: SearchProgress) => void) | undefined;
  /** Aborting it ends the search. */
  signal?: AbortSignal | undefined;
}

interface Job extends SearchListener {
  id: number;
  task: SearchTask;
  resolve: (result: SearchResult) => void;
  reject: (reason: Error) => void;
}

const waiting: Job[] = [];
let running: Job | null = null;
let worker: Worker | null = null;
let idle: NodeJS.Timeout | undefined;
let lastId = 0;

/**
 * Searches in the one thread that this process has for it; searches follow each other.
 * @throws {SearchesFull | SearchCancelled}
 */
export function searchInThread(task: SearchTask, listener: SearchListener = {}): Promise<SearchResult> {
  if (waiting.length >= MOST_WAITING) return Promise.reject(new SearchesFull('Too many searches wait.'));
  return new Promise((resolve, reject) => {
    const job: Job = { ...listener, id: (lastId += 1), task, resolve, reject };
    if (listener.signal?.aborted) return reject(new SearchCancelled('Cancelled.'));
    listener.signal?.addEventListener('abort', () => cancel(job), { once: true });
    waiting.push(job);
    startNext();
  });
}

function startNext(): void {
  if (running) return;
  running = waiting.shift() ?? null;
  clearTimeout(idle);
  if (running) tell({ kind: 'search', id: running.id, task: running.task });
  else idle = setTimeout(stopThread, IDLE_MS).unref();
}

/** Who asked is answered at once; the thread stops at its next step. */
function cancel(job: Job): void {
  const at = waiting.indexOf(job);
  if (at >= 0) waiting.splice(at, 1);
  else if (running === job) tell({ kind: 'cancel', id: job.id });
  job.reject(new SearchCancelled('Cancelled.'));
}

function tell(message: ToThread): void {
  worker ??= startThread();
  worker.ref();
  worker.postMessage(message);
}

function startThread(): Worker {
  const started = new Worker(THREAD_FILE);
  started.on('message', hear);
  started.on('error', (error) => lose(started, error));
  started.on('exit', () => lose(started, new Error('The search ended unexpectedly.')));
  return started;
}

function hear(message: FromThread): void {
  if (message.id !== running?.id) return;
  if (message.kind === 'progress') return running.onProgress?.(message.progress);
  if (message.kind === 'result') running.resolve(message.result);
  else running.reject(Object.assign(new Error(message.message), { code: message.code }));
  endRunning();
}

/** The process may end while the thread has nothing to do. */
function endRunning(): void {
  running = null;
  worker?.unref();
  startNext();
}

function lose(lost: Worker, reason: Error): void {
  if (worker !== lost) return;
  worker = null;
  running?.reject(reason);
  if (running) endRunning();
}

function stopThread(): void {
  const stopped = worker;
  worker = null;
  void stopped?.terminate();
}
