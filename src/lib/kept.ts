import { useSyncExternalStore } from 'react';

const listeners = new Set<() => void>();

function read(key: string): string | null {
  try {
    return localStorage.getItem(key);
  } catch {
    return null;
  }
}

/** A choice kept in this browser; lives on for the page alone where storage is refused. */
export function keepChoice(key: string, value: string): void {
  try {
    localStorage.setItem(key, value);
  } catch {
    // Private windows may refuse storage: the choice then lasts until the page is left.
  }
  for (const listener of listeners) listener();
}

export function keptChoice(key: string): string | null {
  return read(key);
}

export function useKeptChoice(key: string): string | null {
  return useSyncExternalStore(
    (changed) => {
      listeners.add(changed);
      window.addEventListener('storage', changed);
      return () => {
        listeners.delete(changed);
        window.removeEventListener('storage', changed);
      };
    },
    () => read(key),
  );
}
