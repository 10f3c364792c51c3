import { JobCancelled, type JobWatch } from '../threads/messages';

/** More often nobody reads it. */
const TELL_EVERY_MS = 150;

/** How far a trial is, in days of stations, told now and then; ends the trial when who asked has gone. */
export class TrialSteps {
  #before = 0;
  #toldMs = -Infinity;

  constructor(
    private readonly all: number,
    private readonly watch: JobWatch,
  ) {}

  /** Within a part of the trial so many days are done. @throws {JobCancelled} */
  reach(days: number): void {
    if (this.watch.isCancelled()) throw new JobCancelled('The trial was cancelled.');
    const nowMs = performance.now();
    if (nowMs - this.#toldMs < TELL_EVERY_MS) return;
    this.#toldMs = nowMs;
    this.watch.onProgress({ done: Math.min(this.all, this.#before + Math.floor(days)), all: this.all });
  }

  /** A part of the trial is done, with its days. */
  finish(days: number): void {
    this.#before += days;
    this.reach(0);
  }
}
