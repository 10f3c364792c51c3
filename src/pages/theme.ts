import type { APIRoute } from 'astro';
import { ownPath } from '#lib/http/ownPath';
import { keepTheme } from '#lib/http/themeCookie';

/** Keeps the colours that a person chose, and goes back to the page. */
export const POST: APIRoute = async ({ request, cookies, redirect }) => {
  const form = await request.formData();
  const theme = form.get('theme');
  keepTheme(cookies, theme === 'light' || theme === 'dark' ? theme : null);
  return redirect(ownPath(form.get('back')), 303);
};
