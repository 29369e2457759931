import { useEffect, useSyncExternalStore } from 'react';
import { useView } from '../store/use-candling.ts';

const LIGHT = '(prefers-color-scheme: light)';

/** Puts the chosen theme on the page; the system's own where none was chosen. */
export function useTheme(): void {
  const chosen = useView((state) => state.theme);
  const systemIsLight = useSyncExternalStore(
    (onChange) => {
      const query = globalThis.matchMedia(LIGHT);
      query.addEventListener('change', onChange);
      return () => query.removeEventListener('change', onChange);
    },
    () => globalThis.matchMedia(LIGHT).matches,
  );
  const theme = chosen === 'system' ? (systemIsLight ? 'light' : 'dark') : chosen;
  useEffect(() => {
    document.documentElement.dataset.theme = theme;
  }, [theme]);
}
