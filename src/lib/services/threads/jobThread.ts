import path from 'node:path';
import { Worker } from 'node:worker_threads';
import { JobCancelled, JobsFull, type FromThread, type JobListener, type ToThread } from './messages';

/** Jobs that may wait for the one that runs; more are refused. */
const MOST_WAITING = 4;
/** A thread without work ends, and its memory and connections with it. */
const IDLE_MS = 120_000;
/** From the root that web, worker and tests run in; pages are bundled elsewhere. */
const START_FILE = path.resolve('src/lib/services/threads/startThread.mjs');

interface Job<Task, Result> extends JobListener {
  id: number;
  task: Task;
  resolve: (result: Result) => void;
  reject: (reason: Error) => void;
}

export interface JobThreadOptions<Task> {
  /** Each job has a thread of its own, so that what it took of memory is given back when it is done. */
  isFresh?: boolean;
  /** Most memory that the objects of a job may take, MiB; told when its thread begins. */
  heapMib?: (task: Task) => number;
  /** Of it for young objects; without it as much as the process was told to give them. */
  youngMib?: number;
}

/** The one thread that this process has for a kind of job: its event loop goes on meanwhile. Jobs follow each other. */
export class JobThread<Task, Result> {
  readonly #waiting: Job<Task, Result>[] = [];
  readonly #module: string;
  readonly #options: JobThreadOptions<Task>;
  #running: Job<Task, Result> | null = null;
  #worker: Worker | null = null;
  #isEnding = false;
  #idle: NodeJS.Timeout | undefined;
  #lastId = 0;

  /** `file`: of the module that serves the jobs (`serveJobs`), from the root. */
  constructor(file: string, options: JobThreadOptions<Task> = {}) {
    this.#options = options;
    this.#module = new URL(`file://${path.resolve(file)}`).href;
  }

  /** Does a job when those before it are done. @throws {JobsFull | JobCancelled} */
  run(task: Task, listener: JobListener = {}): Promise<Result> {
    if (this.#waiting.length >= MOST_WAITING) return Promise.reject(new JobsFull('Too many jobs wait.'));
    return new Promise((resolve, reject) => {
      const job: Job<Task, Result> = { ...listener, id: (this.#lastId += 1), task, resolve, reject };
      if (listener.signal?.aborted) return reject(new JobCancelled('Cancelled.'));
      listener.signal?.addEventListener('abort', () => this.#cancel(job), { once: true });
      this.#waiting.push(job);
      this.#startNext();
    });
  }

  #startNext(): void {
    if (this.#running || this.#isEnding) return;
    this.#running = this.#waiting.shift() ?? null;
    clearTimeout(this.#idle);
    if (this.#running) this.#tell({ kind: 'job', id: this.#running.id, task: this.#running.task });
    else this.#idle = setTimeout(() => void this.#stop(), IDLE_MS).unref();
  }

  /** Who asked is answered at once; the thread stops at its next step. */
  #cancel(job: Job<Task, Result>): void {
    const at = this.#waiting.indexOf(job);
    if (at >= 0) this.#waiting.splice(at, 1);
    else if (this.#running === job) this.#tell({ kind: 'cancel', id: job.id });
    job.reject(new JobCancelled('Cancelled.'));
  }

  #tell(message: ToThread<Task>): void {
    if (message.kind === 'job') this.#worker ??= this.#start(message.task);
    if (!this.#worker) return;
    this.#worker.ref();
    this.#worker.postMessage(message);
  }

  #start(task: Task): Worker {
    const { heapMib, youngMib } = this.#options;
    const resourceLimits = {
      ...(heapMib === undefined ? {} : { maxOldGenerationSizeMb: heapMib(task) }),
      ...(youngMib === undefined ? {} : { maxYoungGenerationSizeMb: youngMib }),
    };
    const started = new Worker(START_FILE, { workerData: { module: this.#module }, resourceLimits });
    started.on('message', (message: FromThread<Result>) => this.#hear(message));
    started.on('error', (error) => this.#lose(started, error));
    started.on('exit', () => this.#lose(started, new Error('The thread ended unexpectedly.')));
    return started;
  }

  #hear(message: FromThread<Result>): void {
    const running = this.#running;
    if (message.id !== running?.id) return;
    if (message.kind === 'progress') return running.onProgress?.(message.progress);
    if (message.kind === 'result') running.resolve(message.result);
    else running.reject(Object.assign(new Error(message.message), { code: message.code }));
    this.#endRunning();
  }

  /** The process may end while the thread has nothing to do. */
  #endRunning(): void {
    this.#running = null;
    if (this.#options.isFresh) return void this.#endThread();
    this.#worker?.unref();
    this.#startNext();
  }

  #lose(lost: Worker, reason: Error): void {
    if (this.#worker !== lost) return;
    this.#worker = null;
    this.#running?.reject(reason);
    if (this.#running) this.#endRunning();
  }

  /** The next job waits until this one’s memory is given back. */
  async #endThread(): Promise<void> {
    this.#isEnding = true;
    await this.#stop();
    this.#isEnding = false;
    this.#startNext();
  }

  async #stop(): Promise<void> {
    const stopped = this.#worker;
    this.#worker = null;
    await stopped?.terminate();
  }
}
