import { useSyncExternalStore } from 'react';
import { keepChoice, keptChoice } from '#src/lib/kept.ts';

export type Theme = 'daylight' | 'darkroom';

const key = 'fringeward.theme';
const listeners = new Set<() => void>();

function wanted(): Theme {
  const kept = keptChoice(key);
  if (kept === 'daylight' || kept === 'darkroom') return kept;
  return matchMedia('(prefers-color-scheme: dark)').matches ? 'darkroom' : 'daylight';
}

/** Puts the kept theme, or the system's, on the page and follows the system until a choice is made. */
export function startTheme(): void {
  document.documentElement.dataset['theme'] = wanted();
  matchMedia('(prefers-color-scheme: dark)').addEventListener('change', () => applyTheme(wanted()));
}

function applyTheme(theme: Theme): void {
  document.documentElement.dataset['theme'] = theme;
  for (const listener of listeners) listener();
}

export function chooseTheme(theme: Theme): void {
  keepChoice(key, theme);
  applyTheme(theme);
}

function present(): Theme {
  return document.documentElement.dataset['theme'] === 'darkroom' ? 'darkroom' : 'daylight';
}

export function useTheme(): Theme {
  return useSyncExternalStore((changed) => {
    listeners.add(changed);
    return () => listeners.delete(changed);
  }, present);
}
