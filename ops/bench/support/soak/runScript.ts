import { spawn } from 'node:child_process';

/** Runs one of our scripts in a process of its own, with settings of its own, to its end. @throws when it fails. */
export function runScript(
  script: string,
  given: string[],
  environment: Record<string, string>,
): Promise<void> {
  const child = spawn(process.execPath, ['--import', 'tsx', script, ...given], {
    env: { ...process.env, ...environment },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  return new Promise((done, failed) => {
    child.once('error', failed);
    child.once('exit', (code, signal) => {
      if (code === 0) done();
      else failed(new Error(`${script} failed (${signal ?? `exit ${code}`}).`));
    });
  });
}
