import { useSyncExternalStore } from 'react';

/** Below this width the periodogram folds to a line, unless the analyst says otherwise. Widths are compared in rem. */
const NARROW = '(max-width: 74.99rem)';

export function isNarrow(): boolean {
  return globalThis.matchMedia(NARROW).matches;
}

export function useNarrow(): boolean {
  return useSyncExternalStore((onChange) => {
    const query = globalThis.matchMedia(NARROW);
    query.addEventListener('change', onChange);
    return () => query.removeEventListener('change', onChange);
  }, isNarrow);
}
