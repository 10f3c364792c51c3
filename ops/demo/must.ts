import type { Outcome } from '#lib/services/outcome';

/** What came of an act of the demo. @throws where it was refused: then the demo does not fit the product any more. */
export function must<T>(outcome: Outcome<T>): T {
  if (outcome.kind === 'done') return outcome.value;
  throw new Error(`The demo was refused: ${JSON.stringify(outcome)}.`);
}
