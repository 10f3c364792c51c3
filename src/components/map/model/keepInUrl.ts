/**
 * Puts a parameter into the page's address, or takes it out (null), without a step of the browser's history, and into the links and the form
 * of the period line, so that a change of period keeps it.
 */
export function keepInUrl(name: string, value: string | null): void {
  const here = withParameter(new URL(location.href), name, value);
  history.replaceState(history.state, '', here);
  for (const link of document.querySelectorAll<HTMLAnchorElement>('.period-line a[href]')) {
    link.href = withParameter(new URL(link.href), name, value);
  }
  for (const form of document.querySelectorAll<HTMLFormElement>('.period-line form')) {
    form.querySelector(`input[type="hidden"][name="${name}"]`)?.remove();
    if (value !== null) form.prepend(hiddenInput(name, value));
  }
}

function withParameter(url: URL, name: string, value: string | null): string {
  if (value === null) url.searchParams.delete(name);
  else url.searchParams.set(name, value);
  const query = url.searchParams.toString().replaceAll('%3A', ':').replaceAll('%2C', ',');
  return `${url.pathname}${query === '' ? '' : `?${query}`}${url.hash}`;
}

function hiddenInput(name: string, value: string): HTMLInputElement {
  const input = document.createElement('input');
  return Object.assign(input, { type: 'hidden', name, value });
}
