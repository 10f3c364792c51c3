import { spawn } from 'node:child_process';
import type { Readable, Writable } from 'node:stream';

/** A program that runs, with its ends to read from and write to. */
export interface Tool {
  input: Writable;
  output: Readable;
  /** Resolves when it has ended well. @throws with what it said on standard error otherwise. */
  ended: Promise<void>;
}

const MOST_COMPLAINT_CHARACTERS = 2000;

/** Starts a program. `goodCodes` are the exit codes that count as well ended; `environment` is added to ours. */
export function startTool(
  command: string,
  args: string[],
  { environment = {}, goodCodes = [0] }: { environment?: Record<string, string>; goodCodes?: number[] } = {},
): Tool {
  const child = spawn(command, args, {
    env: { ...process.env, ...environment },
    stdio: ['pipe', 'pipe', 'pipe'],
  });
  let complaint = '';
  child.stderr.setEncoding('utf8');
  child.stderr.on(
    'data',
    (text: string) => (complaint = (complaint + text).slice(-MOST_COMPLAINT_CHARACTERS)),
  );
  const ended = new Promise<void>((done, failed) => {
    child.once('error', (error) => failed(new Error(`${command} does not start: ${error.message}`)));
    child.once('close', (code, signal) =>
      code !== null && goodCodes.includes(code)
        ? done()
        : failed(new Error(`${command} ended with ${code ?? signal}: ${complaint.trim()}`)),
    );
  });
  ended.catch(() => undefined);
  return { input: child.stdin, output: child.stdout, ended };
}
