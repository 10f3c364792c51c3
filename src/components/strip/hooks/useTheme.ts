import { useSyncExternalStore } from 'react';
import { type Theme } from '#lib/format/levelRamp';
import { PREFERS_DARK, themeNow } from '../model/theme';

/** The theme in force, followed; light where there is no page yet. */
export function useTheme(): Theme {
  return useSyncExternalStore(subscribe, themeNow, () => 'light');
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
