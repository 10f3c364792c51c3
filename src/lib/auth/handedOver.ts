import { Problem } from '#lib/http/problem';

/** The refusal of somebody signed in by a password that somebody else handed over. */
export const passwordFirst = () =>
  new Problem(
    403,
    'password-first',
    'Change your password first',
    'Your password was handed over to you: change it under “Your account”, or by POST /api/v1/me/password, then come back. Nothing else is open until then.',
  );
