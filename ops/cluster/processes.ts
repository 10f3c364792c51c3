import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, openSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import type { Layout } from './layout';

const STOP_WITHIN_MS = 40_000;

/** Starts a process that goes on without us: its id stands in `run/`, its output in `log/`. */
export function startProcess(
  layout: Layout,
  name: string,
  command: readonly string[],
  environment: Record<string, string> = {},
): void {
  for (const folder of ['run', 'log']) mkdirSync(join(layout.directory, folder), { recursive: true });
  const log = openSync(join(layout.directory, 'log', `${name}.log`), 'a');
  const [program = '', ...rest] = command;
  const child = spawn(program, rest, {
    env: { ...process.env, ...environment },
    stdio: ['ignore', log, log],
    detached: true,
  });
  child.on('error', (error) => console.error(`${name}: ${error.message}`));
  child.unref();
  if (child.pid !== undefined) writeFileSync(pidPath(layout, name), `${child.pid} ${startOf(child.pid)}\n`);
}

/** The process of a name while it runs; an id that another process has got since is not ours. */
export function pidOf(layout: Layout, name: string): number | null {
  const path = pidPath(layout, name);
  if (!existsSync(path)) return null;
  const [pid = '', started] = readFileSync(path, 'utf8').trim().split(' ');
  return started !== undefined && startOf(Number(pid)) === started ? Number(pid) : null;
}

/** Names of all that was started, whether it still runs or not. */
export function startedNames({ directory }: Layout): string[] {
  const folder = join(directory, 'run');
  if (!existsSync(folder)) return [];
  return readdirSync(folder).flatMap((file) => (file.endsWith('.pid') ? [file.slice(0, -4)] : []));
}

/** Ends it without warning. @returns whether it ran. */
export function killProcess(layout: Layout, name: string): boolean {
  const pid = pidOf(layout, name);
  if (pid !== null) process.kill(pid, 'SIGKILL');
  return pid !== null;
}

/** Asks it to end, and ends it if it does not. */
export async function stopProcess(layout: Layout, name: string): Promise<void> {
  const pid = pidOf(layout, name);
  if (pid !== null) {
    process.kill(pid, 'SIGTERM');
    const deadline = Date.now() + STOP_WITHIN_MS;
    while (pidOf(layout, name) !== null && Date.now() < deadline) await sleep(100);
    killProcess(layout, name);
  }
  rmSync(pidPath(layout, name), { force: true });
}

function pidPath({ directory }: Layout, name: string): string {
  return join(directory, 'run', `${name}.pid`);
}

/** When a process began, in the kernel's ticks; empty where there is none, or nothing but its exit. */
function startOf(pid: number): string {
  try {
    const fields = readFileSync(`/proc/${pid}/stat`, 'utf8')
      .replace(/^.*\) /s, '')
      .split(' ');
    return fields[0] === 'Z' ? '' : (fields[19] ?? '');
  } catch {
    return '';
  }
}
