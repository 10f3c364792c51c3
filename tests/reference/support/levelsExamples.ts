import { expect, test } from 'vitest';
import { present, readJson } from './fixtures';

/** One entry of fixtures/reference/levels.json; `source` and `status` say where its values come from. */
export interface Example {
  id: string;
  what: string;
  input: unknown;
  expect: unknown;
  published?: unknown;
  tolerance_vs_published_dB?: number;
  wrong_results_to_catch?: Record<string, number | string>;
  source: string;
}

export const { examples } = readJson<{ examples: Example[] }>('reference/levels.json');

/** Whether an example is of Lden, Ldn or CNEL (checked in lden.test.ts) or of anything else (levels.test.ts). */
export function isOfWholeDays({ id }: Example): boolean {
  return /^(const60|ldn|lden|real)-/.test(id);
}

const checked = new Set<string>();

/** Makes a test of the example of that id; its name and source become the test's. */
export function check(id: string, verify: (example: Example) => void): void {
  const example = present(
    examples.find((candidate) => candidate.id === id),
    id,
  );
  checked.add(id);
  test(`${id}: ${example.what} (${example.source})`, () => verify(example));
}

/** Ids of some examples that no `check` of the running file has looked at. */
export function unchecked(among: readonly Example[]): string[] {
  return among.map(({ id }) => id).filter((id) => !checked.has(id));
}

export function expectLevelNear(actual: number | null, wanted: unknown, tolerance = 1e-4): void {
  expect(Math.abs(present(actual) - Number(wanted)), `${actual} for ${String(wanted)}`).toBeLessThanOrEqual(
    tolerance,
  );
}

/** The value, the published value within its tolerance, and none of the wrong ones. */
export function expectLevel(actual: number | null, example: Example): void {
  expectLevelNear(actual, example.expect);
  if (example.published !== undefined) {
    expectLevelNear(actual, example.published, example.tolerance_vs_published_dB);
  }
  for (const [mistake, wrong] of Object.entries(example.wrong_results_to_catch ?? {})) {
    expect(Math.abs(present(actual) - Number(wrong)), mistake).toBeGreaterThan(0.3);
  }
}
