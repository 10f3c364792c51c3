import { openImport, type Upload } from '#ingest/imports/open';
import { giveUpUpload } from '#ingest/imports/uploads/giveUp';
import { requireStation } from '#lib/auth/guards';
import { type Import } from '#lib/contracts/imports';
import { submitForm } from '#lib/http/forms';
import { importIdOf, uploadProblem } from '#lib/http/importOutcome';
import { formParts, textOf } from '#lib/http/multipart';
import { invalidFields, Problem } from '#lib/http/problem';

const MOST_FIELD_BYTES = 1024;

export type Uploaded =
  { isDone: true; opened: Import } | { isDone: false; errors: Record<string, string>; station: string };

/** Takes the form of a new import; the file goes to disk as it comes in. */
export async function takeUpload(
  request: Request,
  by: Omit<Upload, 'station' | 'fileName'>,
): Promise<Uploaded> {
  let station = '';
  try {
    for await (const { name, fileName, body } of formParts(request)) {
      if (name === 'station') station = await textOf(body, MOST_FIELD_BYTES);
      if (name !== 'file' || fileName === null) continue;
      if (fileName === '') throw invalidFields([{ field: 'file', message: 'Choose a file.' }]);
      const found = await stationOf(by.networkId, station);
      return { isDone: true, opened: await openImport({ ...by, station: found, fileName }, body) };
    }
    throw invalidFields([{ field: 'file', message: 'Choose a file.' }]);
  } catch (error) {
    const problem = uploadProblem(error);
    if (!(problem instanceof Problem)) throw error;
    return { isDone: false, errors: errorsOf(problem), station };
  }
}

/** Whether a post is the small form that gives an upload up, not the one with a file. */
export function isGivingUp(request: Request): boolean {
  return /^application\/x-www-form-urlencoded\s*(;|$)/i.test(request.headers.get('content-type') ?? '');
}

/** Gives an unfinished upload up; one that is gone already is as well. */
export async function takeGivingUp(
  request: Request,
  { networkId, userId }: Pick<Upload, 'networkId' | 'userId'>,
): Promise<void> {
  await submitForm(request, ({ text }) =>
    giveUpUpload({ networkId, id: importIdOf(text['giveUp']), userId }),
  );
}

async function stationOf(networkId: number, code: string) {
  try {
    return await requireStation(networkId, code);
  } catch (error) {
    if (!(error instanceof Problem)) throw error;
    throw invalidFields([{ field: 'station', message: 'Choose the station that the file is of.' }]);
  }
}

function errorsOf(problem: Problem): Record<string, string> {
  const fields = problem.extra.members?.['fields'] as { field: string; message: string }[] | undefined;
  if (fields) return Object.fromEntries(fields.map(({ field, message }) => [field, message]));
  return { file: problem.detail ?? problem.title };
}
