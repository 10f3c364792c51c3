import { ZodError } from 'zod';
import { SealedError } from '#lib/services/retention/seal';
import { Problem } from './problem';

/** What a person typed, by field; a field that may hold several values holds the last here and all in `all`. */
export interface FormValues {
  text: Readonly<Record<string, string>>;
  all(name: string): string[];
}

/** A posted form with the files that were chosen in it. */
export interface PostedForm extends FormValues {
  /** The file chosen in a field, or null where none was. */
  file(name: string): File | null;
}

/** Field → what is wrong, in words. An error of the whole form has the empty name. */
export type FormErrors = Readonly<Record<string, string>>;

export type Submission<T> =
  { isDone: true; value: T } | { isDone: false; values: FormValues; errors: FormErrors };

/**
 * Reads a posted form and acts on it. What the person can put right (a refusal, a field that does not fit) comes back with
 * everything that was typed; other errors go on.
 */
export async function submitForm<T>(
  request: Request,
  act: (values: PostedForm) => Promise<T>,
): Promise<Submission<T>> {
  const form = await readForm(request);
  const values = valuesOf(form ?? new FormData());
  if (!form)
    return { isDone: false, values, errors: { '': 'What was sent is no form. Nothing was changed.' } };
  return actOn(values, act);
}

/** The same of a form that asks only, whose fields stand in the address. */
export function submitQuery<T>(
  query: URLSearchParams,
  act: (values: FormValues) => Promise<T>,
): Promise<Submission<T>> {
  return actOn(queryValues(query), act);
}

/** What stands in an address as the values of a form's fields. */
export function queryValues(query: URLSearchParams): FormValues {
  const form = new FormData();
  for (const [name, value] of query) form.append(name, value);
  return valuesOf(form);
}

async function actOn<V extends FormValues, T>(
  values: V,
  act: (values: V) => Promise<T>,
): Promise<Submission<T>> {
  try {
    return { isDone: true, value: await act(values) };
  } catch (error) {
    const errors = formErrors(error);
    if (!errors) throw error;
    return { isDone: false, values, errors };
  }
}

/** The posted form, or null when the body is something else. */
async function readForm(request: Request): Promise<FormData | null> {
  try {
    return await request.formData();
  } catch {
    return null;
  }
}

function valuesOf(form: FormData): PostedForm {
  const texts = [...form].filter((entry): entry is [string, string] => typeof entry[1] === 'string');
  return {
    text: Object.fromEntries(texts.map(([name, value]) => [name, value.trim()])),
    all: (name) => texts.filter(([other]) => other === name).map(([, value]) => value),
    file: (name) => {
      const given = form.get(name);
      return given instanceof File && given.size > 0 ? given : null;
    },
  };
}

/** What was typed in a field to the last space, as a password is; empty where nothing was. */
export function typedExactly({ all }: Pick<FormValues, 'all'>, name: string): string {
  return all(name).at(-1) ?? '';
}

/** A number typed in a form; undefined for an empty field, NaN for what is no number. A decimal comma is a decimal point. */
export function typedNumber(text: string | undefined): number | undefined {
  if (text === undefined || text === '') return undefined;
  return Number(text.replace(',', '.').replace('\u2212', '-'));
}

function formErrors(error: unknown): FormErrors | null {
  if (error instanceof ZodError) {
    return firstOfEach(
      error.issues.map((issue) => ({ field: String(issue.path[0] ?? ''), message: issue.message })),
    );
  }
  if (error instanceof SealedError) return { '': error.message };
  if (!(error instanceof Problem) || error.status < 400 || error.status >= 500) return null;
  const fields = error.extra.members?.['fields'] as { field: string; message: string }[] | undefined;
  return fields ? firstOfEach(fields) : { '': error.detail ?? error.title };
}

function firstOfEach(fields: { field: string; message: string }[]): FormErrors {
  const errors: Record<string, string> = {};
  for (const { field, message } of fields) errors[field] ??= message;
  return errors;
}
