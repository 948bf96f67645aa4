import { useLayoutEffect, useSyncExternalStore } from 'react';
import { z } from 'zod';

const key = 'tockwell-theme';
const themeSchema = z.enum(['light', 'dark']);
type Theme = z.infer<typeof themeSchema>;

const listeners = new Set<() => void>();

function subscribe(listener: () => void): () => void {
  const media = window.matchMedia('(prefers-color-scheme: dark)');
  listeners.add(listener);
  media.addEventListener('change', listener);
  return () => {
    listeners.delete(listener);
    media.removeEventListener('change', listener);
  };
}

function currentTheme(): Theme {
  const chosen = themeSchema.safeParse(document.documentElement.dataset.theme);
  if (chosen.success) return chosen.data;
  return window.matchMedia('(prefers-color-scheme: dark)').matches ? 'dark' : 'light';
}

/** Sets the theme and remembers it; without storage it lasts for this page. */
export function chooseTheme(theme: Theme): void {
  document.documentElement.dataset.theme = theme;
  try {
    localStorage.setItem(key, theme);
  } catch {
    // Storage may be refused; the choice then simply is not remembered.
  }
  tellListeners();
}

export function useTheme(): Theme {
  return useSyncExternalStore(subscribe, currentTheme);
}

function wasChosen(): boolean {
  try {
    return themeSchema.safeParse(localStorage.getItem(key)).success;
  } catch {
    return false;
  }
}

function tellListeners(): void {
  for (const listener of listeners) listener();
}

/** Night while this page is open, for as long as the person has not chosen otherwise. */
export function useNightByDefault(): void {
  useLayoutEffect(() => {
    if (wasChosen()) return undefined;
    document.documentElement.dataset.theme = 'dark';
    tellListeners();
    return () => {
      if (wasChosen()) return;
      delete document.documentElement.dataset.theme;
      tellListeners();
    };
  }, []);
}
