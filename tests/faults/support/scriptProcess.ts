import { spawn } from 'node:child_process';
import { once } from 'node:events';

export interface ScriptEnd {
  code: number | null;
  signal: NodeJS.Signals | null;
  output: string;
}

export interface ScriptProcess {
  kill(signal: NodeJS.Signals): void;
  ended: Promise<ScriptEnd>;
  /** What it has said so far. */
  output(): string;
}

/** Runs one of our scripts in a process of its own, with our environment and some settings more. */
export function runScript(script: string, settings: Record<string, string> = {}): ScriptProcess {
  const child = spawn(process.execPath, ['--import', 'tsx', script], {
    env: { ...process.env, ...settings },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream.on('data', (chunk: Buffer) => (output += chunk.toString()));
  }
  const ended = once(child, 'close').then(([code, signal]) => ({
    code: code as number | null,
    signal: signal as NodeJS.Signals | null,
    output,
  }));
  return { kill: (signal) => child.kill(signal), ended, output: () => output };
}
