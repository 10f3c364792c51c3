/** What a process tells a thread that works for it. */
export type ToThread<Task> = { kind: 'job'; id: number; task: Task } | { kind: 'cancel'; id: number };

/** What the thread answers; an error with its code, by which it is known whether the database is away. */
export type FromThread<Result> =
  | { kind: 'progress'; id: number; progress: Progress }
  | { kind: 'result'; id: number; result: Result }
  | { kind: 'failed'; id: number; message: string; code: string | undefined };

/** How far a job is, in whatever it counts. */
export interface Progress {
  done: number;
  all: number;
}

/** What a job tells and is told while it runs. */
export interface JobWatch {
  onProgress: (progress: Progress) => void;
  isCancelled: () => boolean;
}

/** Who waits for a job. */
export interface JobListener {
  onProgress?: ((progress: Progress) => void) | undefined;
  /** Aborting it ends the job. */
  signal?: AbortSignal | undefined;
}

/** Too many jobs wait already: try again in a few seconds. */
export class JobsFull extends Error {}
/** Who asked has gone. */
export class JobCancelled extends Error {}
