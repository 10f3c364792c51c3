import type { Limit } from '#lib/contracts/limits';
import type { SetOutcome } from '#lib/services/limits/set';
import { invalidFields, notFound, Problem } from './problem';

/** The limit that came of setting, changing or withdrawing one. @throws {Problem} 404, 409, 422 where none did. */
export function limitOf(outcome: SetOutcome): Limit {
  switch (outcome.kind) {
    case 'set':
      return outcome.limit;
    case 'invalid':
      throw invalidFields(outcome.problems);
    case 'unknown':
      throw unknownLimit();
    case 'withdrawn-before':
      throw new Problem(
        409,
        'withdrawn-before',
        'Withdrawn before',
        'Somebody has withdrawn this limit already. Nothing was changed.',
      );
    case 'changed-before':
      throw new Problem(
        409,
        'changed-before',
        'Changed before',
        'Somebody changed this limit while you had it open. Nothing of yours was saved yet: look at the newest version, then save again.',
      );
  }
}

/** 404 for a limit that the network does not have. */
export const unknownLimit = () => notFound('The network has no limit with this number.');

/** The number of a limit in an address; 0, which no limit has, for anything else. */
export function limitIdOf(text: string | undefined): number {
  return /^\d{1,9}$/.test(text ?? '') ? Number(text) : 0;
}
