import { spawn, type ChildProcess } from 'node:child_process';
import { createWriteStream, mkdirSync, rmSync, writeFileSync, type WriteStream } from 'node:fs';
import { join } from 'node:path';

const FIRST_RESTART_MS = 500;
const LONGEST_RESTART_MS = 15_000;
const STEADY_AFTER_MS = 60_000;
const KILL_AFTER_MS = 25_000;

/**
 * One of Bittern's processes: started again when it dies, until it is told to stop. Its output goes to `log/` and its process
 * id to `run/` of the data directory.
 */
export class Child {
  private process: ChildProcess | undefined;
  private restarts = 0;
  private isStopping = false;
  private readonly log: WriteStream;
  private readonly pidPath: string;

  constructor(
    readonly name: string,
    private readonly commandArguments: string[],
    private readonly environment: Record<string, string>,
    dataDirectory: string,
  ) {
    const [logDirectory, runDirectory] = [join(dataDirectory, 'log'), join(dataDirectory, 'run')];
    mkdirSync(logDirectory, { recursive: true });
    mkdirSync(runDirectory, { recursive: true });
    this.log = createWriteStream(join(logDirectory, `${name}.log`), { flags: 'a' });
    this.pidPath = join(runDirectory, `${name}.pid`);
  }

  start(): void {
    const startedMs = Date.now();
    const child = spawn(process.execPath, this.commandArguments, {
      env: { ...process.env, ...this.environment },
      stdio: ['ignore', 'pipe', 'pipe'],
      // Ctrl-C reaches the terminal's whole process group; the order of stopping is ours to keep.
      detached: true,
    });
    this.process = child;
    writeFileSync(this.pidPath, `${child.pid ?? ''}\n`);
    child.stdout?.pipe(this.log, { end: false });
    child.stderr?.pipe(this.log, { end: false });
    child.once('exit', (code, signal) => this.afterExit(startedMs, code, signal));
  }

  private afterExit(startedMs: number, code: number | null, signal: string | null): void {
    if (this.isStopping) return;
    if (Date.now() - startedMs > STEADY_AFTER_MS) this.restarts = 0;
    const waitMs = Math.min(LONGEST_RESTART_MS, FIRST_RESTART_MS * 2 ** this.restarts);
    this.restarts += 1;
    console.log(
      `${this.name} ended (${signal ?? `exit ${code}`}); starting it again. Its log: ${this.log.path}`,
    );
    setTimeout(() => this.isStopping || this.start(), waitMs);
  }

  async stop(): Promise<void> {
    this.isStopping = true;
    const child = this.process;
    if (!child || child.exitCode !== null || child.signalCode !== null) return;
    const ended = new Promise((done) => child.once('exit', done));
    child.kill('SIGTERM');
    const lastResort = setTimeout(() => child.kill('SIGKILL'), KILL_AFTER_MS);
    await ended;
    clearTimeout(lastResort);
    rmSync(this.pidPath, { force: true });
  }
}

/** Runs a script to its end, its output on ours. @throws when it fails. */
export function runOnce(commandArguments: string[]): Promise<void> {
  const child = spawn(process.execPath, commandArguments, { stdio: ['ignore', 'inherit', 'inherit'] });
  return new Promise((done, failed) => {
    child.once('error', failed);
    child.once('exit', (code, signal) => {
      if (code === 0) done();
      else failed(new Error(`${commandArguments.at(-1)} failed (${signal ?? `exit ${code}`}).`));
    });
  });
}
