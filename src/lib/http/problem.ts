import { responseOf, type Answer } from './answer';

/** A refusal that the caller is meant to read: RFC 9457 problem details with a stable `code`. */
export class Problem extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    readonly title: string,
    readonly detail?: string,
    /** Further members of the problem document, and headers such as Retry-After. */
    readonly extra: { members?: Record<string, unknown>; headers?: Record<string, string> } = {},
  ) {
    super(detail ?? title);
    this.name = 'Problem';
  }
}

export const badRequest = (detail: string) =>
  new Problem(400, 'bad-request', 'The request cannot be understood', detail);

export const signInFirst = () =>
  new Problem(401, 'sign-in-first', 'Sign in first', 'Sign in, or send an access token that is in force.', {
    headers: { 'WWW-Authenticate': 'Bearer' },
  });

export const notAllowed = (detail = 'Your roles in this network do not include this.') =>
  new Problem(403, 'not-allowed', 'Not allowed', detail);

export const notFound = (what = 'There is nothing here under this name.') =>
  new Problem(404, 'not-found', 'Not found', what);

export const invalidFields = (fields: { field: string; message: string }[]) =>
  new Problem(
    422,
    'invalid-fields',
    'Some fields need attention',
    fields.map(({ field, message }) => (field ? `${field}: ${message}` : message)).join('; '),
    { members: { fields } },
  );

/** A change, or a question, about time whose figures are sealed. */
export const sealed = ({ message }: Error) => new Problem(409, 'sealed', 'Sealed', message);

/** The problem as a response of type `application/problem+json`. */
export function problemResponse(problem: Problem): Response {
  return responseOf(problemAnswer(problem));
}

/** The same before it is a web Response. */
export function problemAnswer(problem: Problem): Answer {
  const { status, code, title, detail, extra } = problem;
  const body = { type: 'about:blank', status, code, title, ...(detail ? { detail } : {}), ...extra.members };
  return {
    status,
    headers: { 'Content-Type': 'application/problem+json', 'Cache-Control': 'no-store', ...extra.headers },
    body: JSON.stringify(body),
  };
}
