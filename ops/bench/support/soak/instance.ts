import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, openSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { startDatabase } from '#ops/database/server';
import { untilAnswers } from '#ops/start/untilAnswers';
import { freePorts } from './ports';

const VICTIMS = ['web', 'worker', 'database', 'web2', 'worker2'] as const;
export type Victim = (typeof VICTIMS)[number];

const START_TIMEOUT_MS = 90_000;
const STOP_TIMEOUT_MS = 25_000;
const AFTER_OWN_END_MS = 500;

/** A MariaDB, a web and a worker of the soak's own, or two of each, each of which may be killed and is then started again. */
export class Instance {
  /** How often a process ended though nobody had killed it. */
  ownEnds = 0;
  readonly #processes = new Map<Victim, ChildProcess>();
  readonly #restarts = new Set<Promise<void>>();
  readonly #directory: string;
  readonly #ports: { web: number; web2: number; database: number };
  #databaseName = '';
  /** Of web and worker; the database runs on between the two runs. */
  #areWanted = false;
  #isDatabaseWanted = true;

  private constructor(
    directory: string,
    ports: { web: number; web2: number; database: number },
    readonly isPaired: boolean,
  ) {
    this.#directory = directory;
    this.#ports = ports;
  }

  static async start(directory: string, isPaired: boolean): Promise<Instance> {
    const [web = 0, database = 0, web2 = 0] = await freePorts(3);
    const instance = new Instance(directory, { web, web2, database }, isPaired);
    await instance.#startVictim('database');
    return instance;
  }

  /** Of the webs. */
  get origins(): string[] {
    const { web, web2 } = this.#ports;
    return (this.isPaired ? [web, web2] : [web]).map(originAt);
  }

  /** What may be killed. */
  get victims(): readonly Victim[] {
    return this.isPaired ? VICTIMS : VICTIMS.slice(0, 3);
  }

  get #bitterns(): Exclude<Victim, 'database'>[] {
    return this.isPaired ? ['web', 'web2', 'worker', 'worker2'] : ['web', 'worker'];
  }

  get databasePort(): number {
    return this.#ports.database;
  }

  /** Settings of Bittern's processes, on a database of some name. */
  environment(databaseName: string, web: 'web' | 'web2' = 'web'): Record<string, string> {
    return {
      BITTERN_DATA_DIR: this.#directory,
      BITTERN_PORT: String(this.#ports[web]),
      BITTERN_ORIGIN: originAt(this.#ports[web]),
      // Monitors that all post from one address would share what an address may do.
      BITTERN_TRUSTED_PROXIES: '1',
      BITTERN_DB_HOST: '127.0.0.1',
      BITTERN_DB_PORT: String(this.#ports.database),
      BITTERN_DB_USER: 'bittern',
      BITTERN_DB_PASSWORD: 'soak',
      BITTERN_DB_NAME: databaseName,
      BITTERN_PERSONAL_DATA_KEY: 'ab'.repeat(32),
      BITTERN_LOG_LEVEL: 'warn',
    };
  }

  /** Starts webs and workers on a database, and waits until the webs answer. */
  async startBittern(databaseName: string): Promise<void> {
    this.#databaseName = databaseName;
    this.#areWanted = true;
    await Promise.all(this.#bitterns.map((victim) => this.#startVictim(victim)));
    await Promise.all(this.origins.map((origin) => untilAnswers(`${origin}/healthz`, START_TIMEOUT_MS)));
  }

  /** Kills a process outright and starts it again after `downMs`. */
  async kill(victim: Victim, downMs: number): Promise<void> {
    const child = this.#processes.get(victim);
    if (!child || hasEnded(child)) return;
    child.removeAllListeners('exit');
    await ended(child, 'SIGKILL');
    await sleep(downMs);
    if (this.#isWanted(victim)) await this.#startVictim(victim);
  }

  /** Asks web and worker to finish and waits until they have. */
  async stopBittern(): Promise<void> {
    this.#areWanted = false;
    await Promise.all([...this.#restarts]);
    await Promise.all(this.#bitterns.map((victim) => this.#stopVictim(victim)));
  }

  async stop(): Promise<void> {
    await this.stopBittern();
    this.#isDatabaseWanted = false;
    await this.#stopVictim('database');
  }

  #isWanted(victim: Victim): boolean {
    return victim === 'database' ? this.#isDatabaseWanted : this.#areWanted;
  }

  async #startVictim(victim: Victim): Promise<void> {
    const child = victim === 'database' ? await this.#spawnDatabase() : this.#spawnBittern(victim);
    this.#processes.set(victim, child);
    child.once('exit', () => this.#startAgain(victim));
  }

  /** As `ops/start` does: what ends by itself is started again. */
  #startAgain(victim: Victim): void {
    if (!this.#isWanted(victim)) return;
    this.ownEnds += 1;
    const restart = sleep(AFTER_OWN_END_MS).then(() =>
      this.#isWanted(victim) ? this.#startVictim(victim) : undefined,
    );
    this.#restarts.add(restart);
    void restart.finally(() => this.#restarts.delete(restart));
  }

  async #spawnDatabase(): Promise<ChildProcess> {
    const place = { port: this.#ports.database, user: 'bittern', password: 'soak', bufferPoolMiB: 512 };
    return (await startDatabase({ directory: join(this.#directory, 'mariadb'), ...place })).process;
  }

  #spawnBittern(victim: Exclude<Victim, 'database'>): ChildProcess {
    const isWeb = victim === 'web' || victim === 'web2';
    const log = openSync(join(this.#directory, `${victim}-${this.#databaseName}.log`), 'a');
    return spawn(process.execPath, ['--import', 'tsx', isWeb ? webScript() : 'ingest/worker.ts'], {
      env: { ...process.env, ...this.environment(this.#databaseName, isWeb ? victim : 'web') },
      stdio: ['ignore', log, log],
      // Ctrl-C reaches the terminal's whole process group; the order of stopping is ours to keep.
      detached: true,
    });
  }

  async #stopVictim(victim: Victim): Promise<void> {
    const child = this.#processes.get(victim);
    if (!child || hasEnded(child)) return;
    child.removeAllListeners('exit');
    const lastResort = setTimeout(() => child.kill('SIGKILL'), STOP_TIMEOUT_MS);
    await ended(child, 'SIGTERM');
    clearTimeout(lastResort);
  }
}

const originAt = (port: number) => `http://127.0.0.1:${port}`;

/** The built web where there is one, otherwise its stand-in. */
export function webScript(): string {
  return existsSync('dist/server/entry.mjs') ? 'ops/http/server.ts' : 'ops/bench/support/soak/receiver.ts';
}

function hasEnded(child: ChildProcess): boolean {
  return child.exitCode !== null || child.signalCode !== null;
}

function ended(child: ChildProcess, signal: 'SIGKILL' | 'SIGTERM'): Promise<void> {
  const end = new Promise<void>((done) => child.once('exit', () => done()));
  child.kill(signal);
  return end;
}
