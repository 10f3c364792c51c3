import { performance } from 'node:perf_hooks';

/** Two ways to do the same, and how long each took at every turn. */
export interface Compared {
  ms: number[];
  againstMs: number[];
}

/**
 * Does two things turn by turn, so that what else the machine does meets both alike; each once before for warmth when there is
 * more than one turn. Which goes first changes at every turn.
 */
export async function compare(
  turns: number,
  work: (turn: number) => Promise<unknown>,
  against: (turn: number) => Promise<unknown>,
): Promise<Compared> {
  if (turns > 1) {
    await work(-1);
    await against(-1);
  }
  const compared: Compared = { ms: [], againstMs: [] };
  for (let turn = 0; turn < turns; turn += 1) {
    if (turn % 2 === 0) compared.ms.push(await msOf(() => work(turn)));
    compared.againstMs.push(await msOf(() => against(turn)));
    if (turn % 2 === 1) compared.ms.push(await msOf(() => work(turn)));
  }
  return compared;
}

/** Milliseconds that something takes. */
export async function msOf(work: () => Promise<unknown>): Promise<number> {
  const startMs = performance.now();
  await work();
  return performance.now() - startMs;
}

/** The middle of some numbers. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = (sorted.length - 1) / 2;
  return ((sorted[Math.floor(middle)] ?? NaN) + (sorted[Math.ceil(middle)] ?? NaN)) / 2;
}

/** The value that a share of some numbers does not exceed. */
export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)] ?? NaN;
}

/** A number with three digits that matter. */
export function digits(value: number): string {
  return Number(value.toPrecision(3)).toLocaleString('en-GB', { maximumFractionDigits: 3 });
}

/** Prints rows as a Markdown table. */
export function printTable(heads: readonly string[], rows: readonly (readonly string[])[]): void {
  for (const row of [heads, heads.map(() => '---'), ...rows]) console.log(`| ${row.join(' | ')} |`);
  console.log('');
}
