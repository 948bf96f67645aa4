import { useSyncExternalStore } from 'react';
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
  for (const listener of listeners) listener();
}

export function useTheme(): Theme {
  return useSyncExternalStore(subscribe, currentTheme);
}
