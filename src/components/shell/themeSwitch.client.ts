/** Changes the theme without a new page, and keeps the choice by the same address that the plain form posts to. */
document.addEventListener('submit', (event) => {
  const form = event.target;
  if (!(form instanceof HTMLFormElement) || !form.matches('[data-theme-switch]')) return;
  const button = event.submitter;
  if (!(button instanceof HTMLButtonElement)) return;
  event.preventDefault();
  showTheme(button.value);
  const body = new URLSearchParams({ theme: button.value, back: '/' });
  void fetch(form.action, { method: 'POST', body, redirect: 'manual' });
});

function showTheme(theme: string): void {
  if (theme === 'device') delete document.documentElement.dataset['theme'];
  else document.documentElement.dataset['theme'] = theme;
  for (const button of document.querySelectorAll<HTMLButtonElement>('[data-theme-switch] button')) {
    button.ariaPressed = String(button.value === theme);
  }
}
