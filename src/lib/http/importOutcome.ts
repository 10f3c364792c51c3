import { type Import } from '#lib/contracts/imports';
import { type ActOutcome } from '#lib/services/imports/act';
import { UnusableFile } from '#lib/services/imports/unusable';
import { invalidFields, notFound, Problem } from './problem';

/** The import that came of an act. @throws {Problem} 404, 409, 422 where none did. */
export function importFrom(
  outcome: ActOutcome | { kind: 'invalid'; problems: { field: string; message: string }[] },
): Import {
  switch (outcome.kind) {
    case 'done':
      return outcome.import;
    case 'invalid':
      throw invalidFields(outcome.problems);
    case 'not-now':
      throw new Problem(409, 'not-now', 'Not possible in this state', outcome.message);
    case 'unknown':
      throw unknownImport();
  }
}

/** 404 for an import that the network does not have. */
export const unknownImport = () => notFound('The network has no import with this number.');

/** 404 for an upload in parts that the network does not have. */
export const unknownUpload = () =>
  notFound('The network has no such upload; what nobody finishes is removed after three days.');

/** The number of an import in an address; 0, which no import has, for anything else. */
export function importIdOf(text: string | undefined): number {
  return /^\d{1,9}$/.test(text ?? '') ? Number(text) : 0;
}

const NO_ROOM = new Set(['ENOSPC', 'EDQUOT']);

/** A file that is not kept, as a refusal; any other error as it is. */
export function uploadProblem(error: unknown): unknown {
  if (NO_ROOM.has((error as { code?: string }).code ?? '')) {
    const detail = 'The disk is full here. Nothing was kept; tell whoever runs this server.';
    return new Problem(503, 'no-room', 'No room for the file', detail, { headers: { 'Retry-After': '300' } });
  }
  if (!(error instanceof UnusableFile)) return error;
  return error.kind === 'too-large'
    ? new Problem(413, 'too-large', 'Too large', error.message)
    : new Problem(422, 'unreadable', 'No intervals could be read', error.message);
}
