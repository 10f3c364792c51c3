import type { APIRoute } from 'astro';
import { ownPath } from '#lib/http/ownPath';

const YEAR_SEC = 365 * 86_400;

/** Keeps the colours that a person chose, and goes back to the page. */
export const POST: APIRoute = async ({ request, cookies, redirect }) => {
  const form = await request.formData();
  const theme = form.get('theme');
  if (theme === 'light' || theme === 'dark') {
    cookies.set('bittern-theme', theme, { path: '/', sameSite: 'lax', httpOnly: true, maxAge: YEAR_SEC });
  } else {
    cookies.delete('bittern-theme', { path: '/' });
  }
  return redirect(ownPath(form.get('back')), 303);
};
