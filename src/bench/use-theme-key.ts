import { useSyncExternalStore } from 'react';

/** Changes whenever the colours of the page do: plots then read them anew. */
export function useThemeKey(): string {
  return useSyncExternalStore(watchTheme, () => document.documentElement.dataset.theme ?? 'dark');
}

function watchTheme(onChange: () => void): () => void {
  const observer = new MutationObserver(onChange);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
  return () => observer.disconnect();
}
