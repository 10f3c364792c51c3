import type { Outcome } from '#lib/services/outcome';
import { invalidFields, notFound, Problem } from './problem';

/** The value that an act came to. @throws {Problem} 404, 409, 422 where nothing was changed. */
export function valueOf<T>(outcome: Outcome<T>): T {
  switch (outcome.kind) {
    case 'done':
      return outcome.value;
    case 'invalid':
      throw invalidFields(outcome.problems);
    case 'unknown':
      throw notFound(outcome.what);
    case 'before':
      throw new Problem(409, outcome.code, 'Done before', outcome.detail);
  }
}

/** The number in an address; 0, which nothing has, for anything else. */
export function idOf(text: string | undefined): number {
  return /^\d{1,9}$/.test(text ?? '') ? Number(text) : 0;
}
