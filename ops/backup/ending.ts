import { SettingsError } from '#lib/config/config';

/** How a backup or a restore ends; what calls them goes by the number. */
export const EXIT = { done: 0, failed: 1, usage: 2, busy: 3, notAsWritten: 3, notEmpty: 4 } as const;

/** An ending that is told in one line, without a stack. */
export class Ending extends Error {
  constructor(
    readonly exitCode: number,
    message: string,
  ) {
    super(message);
    this.name = 'Ending';
  }
}

/** Runs a command's work, tells what went wrong on standard error, and answers the exit code. */
export async function exitCodeOf(work: () => Promise<void>): Promise<number> {
  try {
    await work();
    return EXIT.done;
  } catch (error) {
    if (error instanceof Ending) {
      console.error(error.message);
      return error.exitCode;
    }
    console.error(error instanceof Error ? error.message : error);
    return error instanceof SettingsError ? EXIT.usage : EXIT.failed;
  }
}
