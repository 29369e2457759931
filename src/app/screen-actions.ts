import type { Candling } from '../store/candling.ts';
import type { Theme } from '../store/view-store.ts';

/** Puts the cursor into the docket's find field. */
export function focusFind({ view }: Candling): void {
  view.setState({ docketHidden: false });
  queueMicrotask(() => document.getElementById('docket-find')?.focus());
}

const NEXT_THEME: Readonly<Record<Theme, Theme>> = { system: 'dark', dark: 'light', light: 'system' };

export function cycleTheme({ view }: Candling): void {
  view.setState({ theme: NEXT_THEME[view.getState().theme] });
}

/** Moves the focus between docket, bench and case sheet. */
export function goToRegion(step: 1 | -1): void {
  const regions = [...document.querySelectorAll<HTMLElement>('[data-region]')];
  if (regions.length === 0) return;
  const at = regions.findIndex((region) => region.contains(document.activeElement));
  regions[(at + step + regions.length) % regions.length]?.focus();
}
