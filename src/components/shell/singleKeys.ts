const OFF_KEY = 'bittern-single-keys';

/** Whether keys pressed alone (`/`, `?`) do something; speech input sets them off by accident (WCAG 2.2, 2.1.4). */
export function areSingleKeysOn(): boolean {
  return localStorage.getItem(OFF_KEY) !== 'off';
}

export function setSingleKeys(areOn: boolean): void {
  if (areOn) localStorage.removeItem(OFF_KEY);
  else localStorage.setItem(OFF_KEY, 'off');
}

/** Whether a key goes into a text. */
export function isTyping(event: KeyboardEvent): boolean {
  const { target } = event;
  if (!(target instanceof HTMLElement)) return false;
  return target.isContentEditable || target.matches('input, textarea, select');
}
