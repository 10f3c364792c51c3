import { useSyncExternalStore } from 'react';

export type Theme = 'light' | 'dark';

const PREFERS_DARK = '(prefers-color-scheme: dark)';

/** The theme in force: the one chosen on the page's root element, else the one that the device prefers. */
export function useTheme(): Theme {
  return useSyncExternalStore(subscribe, themeNow);
}

function themeNow(): Theme {
  const chosen = document.documentElement.dataset['theme'];
  if (chosen === 'light' || chosen === 'dark') return chosen;
  return matchMedia(PREFERS_DARK).matches ? 'dark' : 'light';
}

function subscribe(changed: () => void): () => void {
  const media = matchMedia(PREFERS_DARK);
  const observer = new MutationObserver(changed);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
  media.addEventListener('change', changed);
  return () => {
    observer.disconnect();
    media.removeEventListener('change', changed);
  };
}
