import { type SearchProgress, type SearchResult, type SearchTask } from './searchTask';

/** What the web tells the thread that searches. */
export type ToThread = { kind: 'search'; id: number; task: SearchTask } | { kind: 'cancel'; id: number };

/** What the thread answers; an error with its code, by which it is known whether the database is away. */
export type FromThread =
  | { kind: 'progress'; id: number; progress: SearchProgress }
  | { kind: 'result'; id: number; result: SearchResult }
  | { kind: 'failed'; id: number; message: string; code: string | undefined };
