import { spawn } from 'node:child_process';

const MOST_TOLD = 4000;

/**
 * Runs one of our scripts in a process of its own, with settings of its own; what it complains of is told only when it fails.
 * @throws when it fails, or `signal` aborts.
 */
export function runScript(
  script: string,
  given: string[],
  environment: Record<string, string>,
  signal: AbortSignal,
): Promise<void> {
  const child = spawn(process.execPath, ['--import', 'tsx', script, ...given], {
    env: { ...process.env, ...environment },
    stdio: ['ignore', 'ignore', 'pipe'],
    signal,
  });
  let complaints = '';
  child.stderr?.on('data', (chunk: Buffer) => (complaints = `${complaints}${chunk}`.slice(-MOST_TOLD)));
  return new Promise((done, failed) => {
    child.once('error', failed);
    child.once('exit', (code, end) => {
      if (code === 0) done();
      else failed(new Error(`${script} failed (${end ?? `exit ${code}`}):\n${complaints}`));
    });
  });
}
