import { useSyncExternalStore } from 'react';

export type ThemeChoice = 'system' | 'light' | 'dark';

const STORAGE_KEY = 'groundsel.theme';
const listeners = new Set<() => void>();

/** The theme this browser was told to use; `system` when nothing was chosen. */
export function readThemeChoice(): ThemeChoice {
  const value = document.documentElement.dataset['theme'];
  return value === 'light' || value === 'dark' ? value : 'system';
}

/** Applies a theme now and keeps it for this browser; `system` forgets the choice. */
export function chooseTheme(choice: ThemeChoice): void {
  if (choice === 'system') {
    delete document.documentElement.dataset['theme'];
    localStorage.removeItem(STORAGE_KEY);
  } else {
    document.documentElement.dataset['theme'] = choice;
    localStorage.setItem(STORAGE_KEY, choice);
  }
  for (const listener of listeners) listener();
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** The chosen theme and the way to change it; every user of the hook follows. */
export function useTheme(): { choice: ThemeChoice; choose: (choice: ThemeChoice) => void } {
  const choice = useSyncExternalStore(subscribe, readThemeChoice);
  return { choice, choose: chooseTheme };
}
