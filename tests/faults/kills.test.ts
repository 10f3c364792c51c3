import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { expect, test } from 'vitest';

/** Longer by `FAULTS_MINUTES=10`. */
const LONG_MINUTES = Number(process.env['FAULTS_MINUTES'] ?? '0');
const MINUTES = LONG_MINUTES > 0 ? LONG_MINUTES : 0.5;
const LIMIT_MS = (MINUTES * 4 + 10) * 60_000;

/**
 * Two webs and two workers while all five processes are killed at random; every table is compared with a run without kills. The same as
 * `npx tsx ops/bench/soak.ts`, which says more.
 */
test(
  'kill -9 of either web, either worker and the database under load: every table is as without',
  { timeout: LIMIT_MS },
  async () => {
    const given = ['--paired', '--minutes', String(MINUTES), '--seed', '4'];
    const size =
      LONG_MINUTES > 0
        ? ['--stations', '200']
        : ['--stations', '12', '--speed', '240', '--kills-within', '4', '--card-rows', '300'];
    const { code, output } = await soak([...given, ...size]);
    console.log(output);
    expect(code, output).toBe(0);
    expect(output).toContain('The tables are equal.');
    for (const victim of ['web', 'web2', 'worker', 'worker2', 'database']) {
      expect(
        Number(new RegExp(`\\b${victim} (\\d+)`).exec(output)?.[1]),
        `${victim} was killed`,
      ).toBeGreaterThan(0);
    }
  },
);

async function soak(given: string[]): Promise<{ code: number | null; output: string }> {
  const child = spawn(process.execPath, ['--import', 'tsx', 'ops/bench/soak.ts', ...given], {
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (chunk: Buffer) => (output += chunk.toString()));
  const [code] = (await once(child, 'close')) as [number | null];
  return { code, output };
}
