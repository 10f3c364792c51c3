import type { APIContext, APIRoute } from 'astro';
import { ZodError } from 'zod';
import { log } from '#lib/config/log';
import { SealedError } from '#lib/services/retention/seal';
import { isDatabaseAway } from '#db/queries/databaseAway';
import { loggedPath } from './loggedPath';
import { invalidFields, Problem, problemResponse, sealed } from './problem';

/** Wraps a handler so that every way out is an answer to the contract: whatever it throws becomes problem details. */
export function route(handler: (context: APIContext) => Promise<Response> | Response): APIRoute {
  return async (context) => {
    try {
      return await handler(context);
    } catch (error) {
      return problemResponse(problemOf(error, context.url.pathname));
    }
  };
}

/** What to tell the caller about an error; an unforeseen one is logged and told without its insides. */
export function problemOf(error: unknown, path: string): Problem {
  if (error instanceof Problem) return error;
  if (error instanceof SealedError) return sealed(error);
  if (error instanceof ZodError) return invalidFields(fieldsOf(error));
  if (isDatabaseAway(error)) {
    log().warn({ err: error, path: loggedPath(path) }, 'database away');
    return new Problem(
      503,
      'database-away',
      'Not possible at the moment',
      'Keep what you have and try again.',
      {
        headers: { 'Retry-After': '10' },
      },
    );
  }
  log().error({ err: error, path: loggedPath(path) }, 'request failed');
  return new Problem(500, 'failed', 'Something went wrong here', 'Nothing was changed. It has been noted.');
}

function fieldsOf(error: ZodError): { field: string; message: string }[] {
  return error.issues.map((issue) => ({ field: issue.path.join('.'), message: issue.message }));
}
