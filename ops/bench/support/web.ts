import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync } from 'node:fs';
import { once } from 'node:events';
import { createServer, type AddressInfo } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';
import { WEB_ARGUMENTS } from '#ops/start/webArguments';
import { residentMib } from './memory';
import { processorMs } from './processorTime';

const START_MS = 30_000;

/** The web as it is served: the built pages behind the HTTP front, in a process of its own on a free port of loopback. */
export class Web {
  private constructor(
    private readonly process: ChildProcess,
    readonly origin: string,
  ) {}

  /** Starts it; `profileDir`: where it leaves a processor profile when it stops. @throws when nothing is built. */
  static async start(profileDir?: string): Promise<Web> {
    if (!existsSync('dist/server/entry.mjs')) throw new Error('Build the web first: bash ops/build.sh');
    const port = await freePort();
    const profile = profileDir === undefined ? [] : ['--cpu-prof', `--cpu-prof-dir=${profileDir}`];
    const web = spawn(process.execPath, [...profile, ...WEB_ARGUMENTS, 'ops/http/server.ts'], {
      stdio: ['ignore', 'ignore', 'inherit'],
      env: { ...process.env, BITTERN_PORT: String(port), BITTERN_ORIGIN: `http://127.0.0.1:${port}` },
    });
    const started = new Web(web, `http://127.0.0.1:${port}`);
    await started.untilAnswers();
    return started;
  }

  /** Processor time that all its threads have had so far, in milliseconds. */
  get cpuMs(): number {
    return processorMs(this.process.pid ?? NaN);
  }

  /** Its highest resident memory so far, in MiB. */
  get highestMib(): number {
    return residentMib(this.process.pid ?? NaN).highest;
  }

  async stop(): Promise<void> {
    if (this.process.exitCode !== null || this.process.signalCode !== null) return;
    this.process.kill('SIGTERM');
    await once(this.process, 'exit');
  }

  private async untilAnswers(): Promise<void> {
    const deadlineMs = Date.now() + START_MS;
    while (this.process.exitCode === null && Date.now() < deadlineMs) {
      const isUp = await fetch(`${this.origin}/healthz`).then(
        ({ ok }) => ok,
        () => false,
      );
      if (isUp) return;
      await sleep(100);
    }
    await this.stop();
    throw new Error('The web did not start.');
  }
}

async function freePort(): Promise<number> {
  const probe = createServer();
  await new Promise<void>((listening) => probe.listen(0, '127.0.0.1', listening));
  const { port } = probe.address() as AddressInfo;
  await new Promise((closed) => probe.close(closed));
  return port;
}
